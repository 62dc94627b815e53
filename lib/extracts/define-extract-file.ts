import { entryOf, mayLeave } from './dictionary';
import { profiles, type Profile } from './input';

/** One column of a file. What it holds comes from the columns named in `from`, and nothing else. */
export interface ExtractColumn {
  readonly name: string;
  readonly label: string;
  /** `table.column` of the record, as classed in the dictionary. */
  readonly from: readonly string[];
  /** 'code' holds one of `codes`, 'key' a plain key of the protocol; 'yes or no' a yes or a no. Anything else is blanked. */
  readonly kind: 'integer' | 'number' | 'code' | 'key' | 'yes or no' | 'study number';
  readonly unit?: string;
  readonly codes?: readonly string[];
  /** An SQL expression: r is the row, p its participant, site its site, entry the protocol enrolled under, person the study number. */
  readonly sql: string | Readonly<Record<Profile, string>>;
  /** Profiles that carry the column; both unless said. */
  readonly only?: Profile;
}

export interface ExtractFileDefinition {
  /** 'visits' becomes visits.csv. */
  readonly name: string;
  readonly about: string;
  /** Table of the rows, as `r`. */
  readonly table: string;
  /** Further joins. */
  readonly joins?: string;
  /** The calendar day the row belongs to: people who asked for no further data are in it until their day. */
  readonly on: string;
  readonly where?: string;
  readonly order: string;
  readonly columns: readonly ExtractColumn[];
}

export const columnsFor = (file: ExtractFileDefinition, profile: Profile): ExtractColumn[] => file.columns.filter(({ only }) => !only || only === profile);

/** The column every file starts with. */
const studyNumber: ExtractColumn = {
  name: 'study_number',
  label: 'Random number of the person in this extract',
  from: ['participant.code'],
  kind: 'study number',
  sql: 'person.study_number',
};

/**
 * Types a file of an extract; the registry in `files/index.ts` lists it.
 * @throws RangeError when a column comes from anything that is not classed, or that its profile leaves out.
 */
export function defineExtractFile(definition: ExtractFileDefinition): ExtractFileDefinition {
  const file = { ...definition, columns: [studyNumber, ...definition.columns] };
  const refused = profiles.flatMap((profile) =>
    columnsFor(file, profile).flatMap(({ name, from }) => from.filter((source) => !mayLeave(source, profile)).map((source) => `${file.name}.${name} from ${source} (${profile})`)),
  );
  if (refused.length > 0) throw new RangeError(`These may not leave: ${refused.join(', ')}.`);
  return file;
}

/** The first source's class, for the codebook. */
export const classOf = ({ from: [first = ''] }: ExtractColumn): string => {
  const [table = '', column = ''] = first.split('.');
  return entryOf(table, column)?.class ?? 'none';
};

/** Day 1 is the day of enrolment and there is no day 0 (the convention of the CDISC Study Data Tabulation Model). */
export const studyDay = (date: string): string => `(case when ${date} >= p.enrolled_on then ${date} - p.enrolled_on + 1 else ${date} - p.enrolled_on end)::int`;

/** The calendar day of a moment at the site. */
export const atSite = (moment: string): string => `(${moment} at time zone site.time_zone)::date`;

/** Bands of `width` from 0; from `pooledFrom` on they are one. */
export const bands = (value: string, width: number, pooledFrom: number): string =>
  `case when ${value} >= ${pooledFrom} then '${pooledFrom}+' else (${value} / ${width} * ${width}) || '-' || (${value} / ${width} * ${width} + ${width - 1}) end`;

/** The same bands as a list of codes. */
export const bandCodes = (from: number, width: number, pooledFrom: number): string[] => [
  ...Array.from({ length: Math.ceil((pooledFrom - from) / width) }, (_, index) => from + index * width).map((low) => `${low}-${low + width - 1}`),
  `${pooledFrom}+`,
];

type About = { label: string; from: string; sql?: string };
/** `from` alone is enough where the column leaves as it is. */
const sqlOf = ({ from, sql }: About): string => sql ?? `r.${from.split('.')[1] ?? ''}`;

export const code = (name: string, codes: readonly string[], about: About): ExtractColumn => ({ name, label: about.label, from: [about.from], kind: 'code', codes, sql: sqlOf(about) });
export const key = (name: string, about: About): ExtractColumn => ({ name, label: about.label, from: [about.from], kind: 'key', sql: sqlOf(about) });
export const integer = (name: string, about: About & { unit?: string }): ExtractColumn => ({ name, label: about.label, from: [about.from], kind: 'integer', ...(about.unit ? { unit: about.unit } : {}), sql: `(${sqlOf(about)})::int` });
export const number = (name: string, about: About & { unit?: string }): ExtractColumn => ({ name, label: about.label, from: [about.from], kind: 'number', ...(about.unit ? { unit: about.unit } : {}), sql: `(${sqlOf(about)})::float8` });
export const yesOrNo = (name: string, about: About): ExtractColumn => ({ name, label: about.label, from: [about.from], kind: 'yes or no', sql: sqlOf(about) });
export const day = (name: string, about: About & { moment?: true }): ExtractColumn => ({
  name,
  label: about.label,
  from: [about.from],
  kind: 'integer',
  unit: 'study day',
  sql: studyDay(about.moment ? atSite(sqlOf(about)) : sqlOf(about)),
});

/**
 * A day laid out by the schedule. Where the protocol counts from surgery it would tell the day of surgery, and is left empty.
 */
export const scheduleDay = (name: string, about: { label: string; from: string }): ExtractColumn => {
  const column = day(name, about);
  return { ...column, label: `${about.label}; empty where the schedule counts from surgery`, sql: `case when not entry.counts_from_surgery then ${String(column.sql)} end` };
};
