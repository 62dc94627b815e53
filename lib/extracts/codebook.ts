import { classOf, columnsFor, type ExtractColumn } from './define-extract-file';
import { entryOf } from './dictionary';
import type { ExtractDisclosure } from '@/entities/extract';
import { isMarked } from './disclosure';
import { extractFiles } from './files';
import type { Profile } from './input';
import { WITHHELD } from './withhold';

export const codebookColumns = ['file', 'column', 'label', 'holds', 'unit', 'codes', 'class', 'what_was_done', 'values_withheld', 'people_with_any_withheld', 'smallest_group'] as const;
export type CodebookRow = Readonly<Record<(typeof codebookColumns)[number], string>>;

const holds: Record<ExtractColumn['kind'], string> = {
  integer: 'whole number',
  number: 'number',
  code: 'one of the codes',
  key: 'plain key',
  'yes or no': 'yes or no',
  'study number': 'random number of a person',
};

/** What was done to the first column a column comes from. */
function doneTo({ from: [first = ''] }: ExtractColumn, profile: Profile): string {
  const [table = '', column = ''] = first.split('.');
  return entryOf(table, column)?.does[profile] ?? 'left out';
}

/** Study days are said once more beside each column that holds one. */
const unitOf = ({ unit }: ExtractColumn): string => (unit === 'study day' ? 'study day (day 1 is the day of enrolment; there is no day 0)' : (unit ?? ''));

/** The outcome of the disclosure check beside each column by which people are grouped. */
function checkOf(column: ExtractColumn, { withheld, peopleWithAny, smallestGroup }: ExtractDisclosure) {
  const values = withheld.find((one) => one.column === column.name)?.values ?? 0;
  return { values_withheld: String(values), people_with_any_withheld: String(peopleWithAny), smallest_group: String(smallestGroup) };
}
const notChecked = { values_withheld: '', people_with_any_withheld: '', smallest_group: '' };

/** Every column of every file under a profile, in the order of the files. */
export const codebookOf = (profile: Profile, extension: string, disclosure: ExtractDisclosure): CodebookRow[] =>
  extractFiles.flatMap((file) =>
    columnsFor(file, profile).map((column) => ({
      file: `${file.name}.${extension}`,
      column: column.name,
      label: column.label,
      holds: holds[column.kind],
      unit: unitOf(column),
      codes: [...(column.codes ?? []), ...(isMarked(file, column) ? [WITHHELD] : [])].join('; '),
      class: classOf(column),
      what_was_done: isMarked(file, column) ? `${doneTo(column, profile)}; withheld where fewer than ${disclosure.atLeast} people share every marked value` : doneTo(column, profile),
      ...(isMarked(file, column) ? checkOf(column, disclosure) : notChecked),
    })),
  );
