import type { Readable } from 'node:stream';
import type { Work } from '@/lib/work/work';
import type { PersonOfExtract } from './choose-people';
import { columnsFor, type ExtractFileDefinition } from './define-extract-file';
import type { Profile } from './input';

/** Rows the data base hands over at a time. */
const batchRows = 500;

const list = (values: readonly (string | number | null)[]): string => `{${values.map((value) => value ?? 'NULL').join(',')}}`;

/** The people of the extract as four columns that the statement joins. */
export const bindPeople = (people: readonly PersonOfExtract[]): string[] => [
  list(people.map(({ participantId }) => participantId)),
  list(people.map(({ studyNumber }) => studyNumber)),
  list(people.map(({ siteNumber }) => siteNumber)),
  list(people.map(({ until }) => until)),
];

/** The statement of one file: only people of the extract, only until their day, in the order of their random numbers. */
export function statementOf(file: ExtractFileDefinition, profile: Profile): string {
  const columns = columnsFor(file, profile).map(({ name, sql }) => `${typeof sql === 'string' ? sql : sql[profile]} as ${name}`);
  const owner = file.table === 'participant' ? 'r.id' : 'r.participant_id';
  return `with person as materialized (select * from unnest(?::uuid[], ?::text[], ?::int[], ?::date[]) as t(participant_id, study_number, site_number, until)),
      entry as materialized (select id, number, document ->> 'anchor' = 'surgery' as counts_from_surgery from protocol_version)
    select ${columns.join(', ')}
    from person join ${file.table} r on ${owner} = person.participant_id join participant p on p.id = person.participant_id join site on site.id = p.site_id join entry on entry.id = p.protocol_version_id ${file.joins ?? ''}
    where (person.until is null or ${file.on} <= person.until)${file.where ? ` and ${file.where}` : ''}
    order by person.study_number, ${file.order}`;
}

/** One file's rows at once: for the people of an extract, who must be looked at together. */
export const readFile = (work: Work, file: ExtractFileDefinition, profile: Profile, people: readonly PersonOfExtract[]): Promise<Record<string, unknown>[]> =>
  work.sql<Record<string, unknown>>(statementOf(file, profile), bindPeople(people));

/** The part of the ORM's transaction that streams. */
interface Streams {
  raw(sql: string, values: readonly unknown[]): { stream(options: { highWaterMark: number }): Readable };
}

/** Streams one file's rows inside the transaction of `work`; memory does not grow with the record. */
export function streamFile(work: Work, file: ExtractFileDefinition, profile: Profile, people: readonly PersonOfExtract[]): Readable {
  const transaction = work.em.getTransactionContext<Streams>();
  if (!transaction) throw new Error('An extract is read inside a transaction only.');
  return transaction.raw(statementOf(file, profile), bindPeople(people)).stream({ highWaterMark: batchRows });
}
