/** Turns the data sets of the reference cases into the columns that the survival estimators take. */
import { loadTable, Table, type ReferenceCase } from './reference';

/** Names under which the data sets keep the same thing. */
const TIME = ['time', 'stop', 'futime', 'times'];
const EVENT = ['status', 'event', 'fustat'];
const ENTRY = ['start', 'entry'];

/** The rows of a case, from its file (filtered) or written out in it. */
export function tableOf({ dataset }: Pick<ReferenceCase, 'dataset'>): Table {
  if (dataset?.file !== undefined) {
    const table = loadTable(dataset.file);
    return dataset.rows === undefined ? table : table.filter(dataset.rows);
  }
  const inline = (dataset?.inline_rows ?? dataset?.inline) as Record<string, readonly (number | string | null)[]> | undefined;
  if (inline === undefined) throw new Error('the case names no rows');
  return new Table(new Map(Object.entries(inline).map(([name, values]) => [name, values.map((value) => (value === null ? '' : String(value)))])));
}

function pick(table: Table, names: readonly string[]): string | undefined {
  return names.find((name) => table.names.includes(name));
}

export function timesOf(table: Table): Float64Array {
  return table.numbers(pick(table, TIME) ?? 'time');
}

export function entryOf(table: Table): { entry?: Float64Array } {
  const name = pick(table, ENTRY);
  return name === undefined ? {} : { entry: table.numbers(name) };
}

export function followUpOf(table: Table) {
  return { time: timesOf(table), event: Uint8Array.from(table.numbers(pick(table, EVENT) ?? 'status')), ...entryOf(table) };
}

/** Codes 0, 1, 2 … for the levels of a column: numbers by size, words by alphabet. */
export function levelsOf(cells: readonly string[]): { levels: string[]; codes: Int32Array } {
  const levels = [...new Set(cells)].sort((a, b) => (Number.isNaN(Number(a) - Number(b)) ? (a < b ? -1 : 1) : Number(a) - Number(b)));
  const place = new Map(levels.map((level, code) => [level, code]));
  return { levels, codes: Int32Array.from(cells, (cell) => place.get(cell) as number) };
}

/** Confidence level of a case: `params.conf`, or 0.95. */
export function levelOf({ params }: Pick<ReferenceCase, 'params'>): number {
  return typeof params?.conf === 'number' ? params.conf : 0.95;
}

/** A column that the case names in `params`, or the one known for its id. */
export function columnOf({ params, id }: Pick<ReferenceCase, 'params' | 'id'>, param: string, known: readonly (readonly [RegExp, string])[]): string | undefined {
  const named = params?.[param];
  return typeof named === 'string' ? named : known.find(([pattern]) => pattern.test(id))?.[1];
}
