import type pg from 'pg';

interface Copied {
  readonly rows: number;
  readonly bytes: number;
}

/**
 * Runs `copy (…) to stdout` and reads the whole stream without keeping it. The client class hands these calls to whatever
 * query is running; its own queries do not take them.
 */
class CopyOut {
  private bytes = 0;
  private rows = 0;
  private failure: Error | null = null;

  constructor(
    private readonly text: string,
    private readonly done: (error: Error | null, copied: Copied) => void,
  ) {}

  submit(connection: { query(text: string): void }): void {
    connection.query(this.text);
  }

  handleCopyData({ chunk }: { chunk: Buffer }): void {
    this.bytes += chunk.length;
  }

  handleCommandComplete({ text }: { text: string }): void {
    this.rows = Number(text.split(' ').at(-1));
  }

  handleError(error: Error): void {
    this.failure = error;
  }

  handleReadyForQuery(): void {
    this.done(this.failure, { rows: this.rows, bytes: this.bytes });
  }
}

/** Copies the rows of a select as CSV and counts them. */
export function copyOut(client: pg.Client, select: string): Promise<Copied> {
  return new Promise((resolve, reject) => {
    const running = new CopyOut(`copy (${select}) to stdout with (format csv, header)`, (error, copied) => (error ? reject(error) : resolve(copied)));
    client.query(running as unknown as pg.Submittable);
  });
}
