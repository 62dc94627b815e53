import { z } from 'zod';

/** Where files are kept: a folder (the default) or a bucket that speaks the S3 protocol. */
export type StorageSettings =
  | { kind: 'folder'; path: string }
  | { kind: 's3'; endpoint: string; region: string; bucket: string; accessKeyId: string; secretAccessKey: string };

/** What the surroundings of the process say, under the variables' own names. Each member is checked when it is read. */
export interface Env {
  readonly DATABASE_URL: string;
  readonly OWNER_DATABASE_URL: string;
  readonly NEXTAUTH_URL: string;
  readonly NEXTAUTH_SECRET: string;
  readonly SMTP_URL: string;
  readonly MAIL_FROM: string;
  readonly STORAGE: StorageSettings;
  /** How many proxies of our own stand in front and add to X-Forwarded-For. */
  readonly TRUSTED_PROXIES: number;
  readonly DEMO: boolean;
  readonly DEMO_MAILBOX_URL: string | null;
  readonly LOG_LEVEL: 'fatal' | 'error' | 'warn' | 'info' | 'debug' | 'trace' | 'silent';
  readonly PRODUCTION: boolean;
  readonly APP_VERSION: string;
}

const postgresUrl = z.url({ protocol: /^postgres(ql)?$/ });
const httpUrl = z.url({ protocol: /^https?$/ });

/**
 * Reads one variable.
 * @throws Error with a sentence that names the variable and says what it should hold; never its value.
 */
function read<T>(name: string, schema: z.ZodType<T>, should: string): T {
  const raw = process.env[name];
  const parsed = schema.safeParse(raw === '' ? undefined : raw);
  if (parsed.success) return parsed.data;
  throw new Error(`${name} ${raw ? 'is not usable' : 'is not set'}: it should hold ${should}.`);
}

function readStorage(): StorageSettings {
  const setting = read('STORAGE', z.string().default('folder:.data/files'), "'folder:' and a path, or 's3:' and the name of a bucket");
  if (setting.startsWith('folder:')) return { kind: 'folder', path: setting.slice('folder:'.length) };
  if (!setting.startsWith('s3:')) throw new Error("STORAGE is not usable: it should hold 'folder:' and a path, or 's3:' and the name of a bucket.");
  return {
    kind: 's3',
    bucket: setting.slice('s3:'.length),
    endpoint: read('S3_ENDPOINT', httpUrl, 'the http address of the file store'),
    region: read('S3_REGION', z.string().default('us-east-1'), 'the region of the bucket'),
    accessKeyId: read('S3_ACCESS_KEY_ID', z.string(), 'the key id for the file store'),
    secretAccessKey: read('S3_SECRET_ACCESS_KEY', z.string(), 'the secret key for the file store'),
  };
}

const readers: { [K in keyof Env]: () => Env[K] } = {
  DATABASE_URL: () => read('DATABASE_URL', postgresUrl, 'the postgresql:// address that the application signs in with'),
  OWNER_DATABASE_URL: () => read('OWNER_DATABASE_URL', postgresUrl, 'the postgresql:// address of the role that owns the tables'),
  NEXTAUTH_URL: () => read('NEXTAUTH_URL', httpUrl, 'the one address people open, such as https://registry.example').replace(/\/$/, ''),
  NEXTAUTH_SECRET: () => read('NEXTAUTH_SECRET', z.string().min(32), 'at least 32 random characters'),
  SMTP_URL: () => read('SMTP_URL', z.url({ protocol: /^smtps?$/ }), 'the smtp:// address of the mail server'),
  MAIL_FROM: () => read('MAIL_FROM', z.string().min(3), "the sender of letters, such as 'Tidemark <registry@tidemark.example>'"),
  STORAGE: readStorage,
  TRUSTED_PROXIES: () => Number(read('TRUSTED_PROXIES', z.string().regex(/^[0-5]$/).default('0'), 'how many proxies of your own stand in front, 0 to 5')),
  DEMO: () => read('DEMO', z.enum(['0', '1']).default('0'), '1 for the demonstration, else 0') === '1',
  DEMO_MAILBOX_URL: () => read('DEMO_MAILBOX_URL', httpUrl.optional(), 'the address of the demonstration’s mail capture') ?? null,
  LOG_LEVEL: () =>
    read('LOG_LEVEL', z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'), 'fatal, error, warn, info, debug, trace or silent'),
  PRODUCTION: () => process.env['NODE_ENV'] === 'production',
  APP_VERSION: () => read('APP_VERSION', z.string().default('0.1.0'), 'the version that is running'),
};

const lazy = Object.defineProperties(
  {},
  Object.fromEntries(Object.entries(readers).map(([key, get]) => [key, { get, enumerable: true }])),
) as Env;

/**
 * The settings of this process; the only reader of `process.env`. Nothing is read before it is asked for,
 * so a migration needs no mail server and a test may set a variable before the code that uses it.
 */
export function env(): Env {
  return lazy;
}
