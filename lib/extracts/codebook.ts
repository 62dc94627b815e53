import { classOf, columnsFor, type ExtractColumn } from './define-extract-file';
import { entryOf } from './dictionary';
import { extractFiles } from './files';
import type { Profile } from './input';

export const codebookColumns = ['file', 'column', 'label', 'holds', 'unit', 'codes', 'class', 'what_was_done'] as const;
export type CodebookRow = Readonly<Record<(typeof codebookColumns)[number], string>>;

const holds: Record<ExtractColumn['kind'], string> = {
  integer: 'whole number',
  number: 'number',
  code: 'one of the codes',
  key: 'key of the protocol',
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

/** Every column of every file under a profile, in the order of the files. */
export const codebookOf = (profile: Profile, extension: string): CodebookRow[] =>
  extractFiles.flatMap((file) =>
    columnsFor(file, profile).map((column) => ({
      file: `${file.name}.${extension}`,
      column: column.name,
      label: column.label,
      holds: holds[column.kind],
      unit: unitOf(column),
      codes: (column.codes ?? []).join('; '),
      class: classOf(column),
      what_was_done: doneTo(column, profile),
    })),
  );
