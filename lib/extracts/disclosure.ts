import type { ExtractDisclosure } from '@/entities/extract';
import type { Work } from '@/lib/work/work';
import type { PersonOfExtract } from './choose-people';
import { cleanCell, type Cell } from './clean-cell';
import { classOf, columnsFor, type ExtractColumn, type ExtractFileDefinition } from './define-extract-file';
import { participants } from './files/participants';
import type { Profile } from './input';
import { readFile } from './read-file';
import { withhold } from './withhold';

/**
 * Fewest people who must share every marked value: 11 for files anybody may have (at most 0.09, a precedent of US public
 * files), 5 for files under an agreement (at most 0.2). El Emam 2013, as restated in the requirements base, DEI-07.
 */
export const smallestAllowed: Readonly<Record<Profile, number>> = { open: 11, controlled: 5 };

/**
 * Columns that may point at a person together, least important for the study's question first: the order in which they are
 * withheld. The treated side comes last because it can be worked out from the volumes: withholding it would hide nothing.
 */
const order = ['left_weeks_band', 'height_band', 'weeks_since_surgery_band', 'site_number', 'dominant_side', 'surgery', 'age_band', 'nodes_removed_band', 'axillary_procedure', 'treated_side'];

/** Is this a column by which people are grouped? The dictionary says: class 'quasi', one value a person. */
export const isMarked = (file: Pick<ExtractFileDefinition, 'table'>, column: ExtractColumn): boolean => file.table === participants.table && classOf(column) === 'quasi';

/**
 * The marked columns of a profile, in the order of withholding.
 * @throws RangeError when a column is marked in the dictionary and has no place in the order.
 */
export function markedColumns(profile: Profile): ExtractColumn[] {
  const marked = columnsFor(participants, profile).filter((column) => isMarked(participants, column));
  const unplaced = marked.filter(({ name }) => !order.includes(name));
  if (unplaced.length > 0) throw new RangeError(`These point at a person and have no place in the order of withholding: ${unplaced.map(({ name }) => name).join(', ')}.`);
  return marked.toSorted((a, b) => order.indexOf(a.name) - order.indexOf(b.name));
}

/** The people of an extract as their file may hold them, and what had to be withheld. */
export async function readPeopleSafely(work: Work, profile: Profile, people: readonly PersonOfExtract[]): Promise<{ rows: Readonly<Record<string, Cell>>[]; disclosure: ExtractDisclosure }> {
  const columns = columnsFor(participants, profile);
  const marked = markedColumns(profile);
  const read = await readFile(work, participants, profile, people);
  const clean = read.map((row) => Object.fromEntries(columns.map((column) => [column.name, cleanCell(column, row[column.name])])));
  const { rows, report } = withhold(clean, marked.map(({ name }) => name), smallestAllowed[profile]);
  return {
    rows,
    disclosure: {
      atLeast: smallestAllowed[profile],
      people: rows.length,
      smallestGroup: report.smallestGroup,
      peopleWithAny: report.rowsWithAny,
      withheld: marked.map(({ name, label }) => ({ column: name, label, values: report.withheld[name] ?? 0 })),
    },
  };
}
