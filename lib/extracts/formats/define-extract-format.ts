import type { Transform } from 'node:stream';

/** How rows become a file. Rows hold cleaned cells only; a format never looks at the record. */
export interface ExtractFormat {
  readonly key: string;
  readonly name: string;
  readonly extension: string;
  readonly contentType: string;
  /** Objects in, text out; the head is written even when there is no row. */
  write(columns: readonly string[]): Transform;
}

/** Types a format; the registry in `index.ts` lists it. */
export function defineExtractFormat(format: ExtractFormat): ExtractFormat {
  return format;
}
