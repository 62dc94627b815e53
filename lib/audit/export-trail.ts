import { Readable } from 'node:stream';
import { Transform } from '@json2csv/node';
import type { Actor } from '@/lib/auth/roles';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import type { TrailFilter } from './input';
import { readEntries } from './list-trail';

const chunk = 500;

/** What will be written to the file: by whom asked, of what, up to which entry. */
export interface TrailExport {
  readonly actor: Actor;
  readonly filter: TrailFilter;
  /** Entries after this moment's last one are not in the file. */
  readonly before: string;
}

/** Notes in the trail that it is taken out, and fixes where it ends. */
export async function exportTrail(work: Work, filter: TrailFilter): Promise<TrailExport> {
  const [last] = await work.sql<{ before: string }>('select (coalesce(max(id), 0) + 1)::text as before from audit_entry');
  await work.event('audit_entry', 'file', { ...filter });
  return { actor: work.actor, filter, before: last?.before ?? '1' };
}

/** A spreadsheet must read text as text: what looks like a formula gets a leading apostrophe. */
const plain = (value: unknown): string => {
  const text = value === null || value === undefined ? '' : typeof value === 'string' ? value : JSON.stringify(value);
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
};

async function* linesOf({ actor, filter, before }: TrailExport): AsyncGenerator<Record<string, string>> {
  let from: string | undefined = before;
  while (from !== undefined) {
    const start: string = from;
    const entries = await withWork(actor, 'audit.list', (work) => readEntries(work, filter, { before: start, limit: chunk }));
    for (const { id, at, who, role, act, subject, code, siteName, changes, reason, hash } of entries)
      for (const change of changes.length > 0 ? changes : [null])
        yield {
          entry: id, at, who: plain(who), role, act, participant: code ?? '', site: siteName ?? '', what: plain(subject),
          field: change?.label ?? '', before: plain(change?.before), after: plain(change?.after), reason: plain(reason), sha256: hash,
        };
    from = entries.length < chunk ? undefined : entries.at(-1)?.id;
  }
}

const columns = ['entry', 'at', 'who', 'role', 'act', 'participant', 'site', 'what', 'field', 'before', 'after', 'reason', 'sha256'];

/** The filtered trail as CSV, one line a changed field, read in chunks: it never stands in memory whole. */
export function trailCsv(taken: TrailExport): ReadableStream<Uint8Array> {
  const csv = Readable.from(linesOf(taken)).pipe(new Transform({ fields: columns }, {}, { objectMode: true }));
  return (Readable.toWeb(csv) as ReadableStream<string>).pipeThrough(new TextEncoderStream());
}
