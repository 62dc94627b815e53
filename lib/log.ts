import pino, { type Logger } from 'pino';
import { env } from './env';

export type { Logger } from 'pino';

/** Names under which personal data or secrets could reach a log line by mistake; they are cut out at two depths. */
const secretNames = [
  'address', 'answers', 'birthDate', 'bornOn', 'comment', 'cookie', 'data', 'email', 'familyName', 'givenName', 'html', 'name', 'note',
  'parameters', 'params', 'password', 'payload', 'phone', 'query', 'reason', 'secret', 'sid', 'sql', 'text', 'to', 'token', 'values',
];

const redacted = [
  ...secretNames.flatMap((name) => [name, `*.${name}`]),
  'req.headers.authorization',
  'req.headers.cookie',
  'err.detail',
];

/** What a log may say about an error: its kind, code and place. A data base's message holds the values of the statement. */
export function describeError(error: unknown): { kind: string; code?: string; at?: string } {
  if (!(error instanceof Error)) return { kind: typeof error };
  const code = 'code' in error && typeof error.code === 'string' ? error.code : undefined;
  const at = error.stack?.split('\n').find((line) => /^\s+at /.test(line))?.trim();
  return { kind: error.constructor.name, ...(code ? { code } : {}), ...(at ? { at } : {}) };
}

/** Makes a logger; tests pass a destination to read what was written. */
export function makeLog(level: string, destination?: pino.DestinationStream): Logger {
  const options: pino.LoggerOptions = {
    level,
    base: undefined,
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: { paths: redacted, censor: '[cut]' },
    serializers: { err: describeError, error: describeError },
  };
  return destination ? pino(options, destination) : pino(options);
}

let shared: Logger | undefined;

/** The log of this process: JSON lines on standard output, without personal data. */
export function log(): Logger {
  shared ??= makeLog(env().LOG_LEVEL);
  return shared;
}
