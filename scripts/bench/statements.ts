import pg from 'pg';

interface Statement {
  readonly text: string;
  readonly values: unknown[];
}

/**
 * Runs a service once and notes every statement it sends to the data base, with its values: the floor of a reading is
 * then those statements alone, sent by a bare client. The ORM signs in through the same client class.
 */
export async function statementsOf(run: () => Promise<unknown>): Promise<Statement[]> {
  const noted: Statement[] = [];
  const client = pg.Client.prototype as unknown as { query(...args: unknown[]): unknown };
  const { query } = client;
  client.query = function noting(this: unknown, ...args: unknown[]) {
    const [first, second] = args;
    const asked = typeof first === 'string' ? { text: first, values: second } : (first as { text?: unknown; values?: unknown });
    if (typeof asked.text === 'string') noted.push({ text: asked.text, values: Array.isArray(asked.values) ? (asked.values as unknown[]) : [] });
    return query.apply(this, args);
  };
  try {
    await run();
  } finally {
    client.query = query;
  }
  if (noted.length === 0) throw new Error('The service sent no statement that could be noted.');
  return noted;
}

/** Sends statements one after the other and reads their rows. */
export async function replay(client: pg.Client, statements: readonly Statement[]): Promise<void> {
  for (const { text, values } of statements) await client.query(values.length === 0 ? { text } : { text, values });
}

/** A bare client on the login of the application, or of the tables' owner. */
export async function connect(login: 'DATABASE_URL' | 'OWNER_DATABASE_URL'): Promise<pg.Client> {
  const connectionString = process.env[login];
  if (!connectionString) throw new Error(`${login} is not set: run this through npm run bench.`);
  const client = new pg.Client({ connectionString });
  await client.connect();
  return client;
}
