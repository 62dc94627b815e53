import { fieldWords, type ValueKind } from './words';

/** One field as it was and as it is. */
export interface FieldChange {
  readonly column: string;
  readonly label: string;
  readonly kind: ValueKind;
  readonly before: unknown;
  readonly after: unknown;
}

type Image = Readonly<Record<string, unknown>> | null;

/** Keys and versions say nothing to a reader. */
const isPlumbing = (column: string): boolean => column === 'id' || column === 'version' || column.endsWith('_id') || column === 'client_key';
const same = (a: unknown, b: unknown): boolean => JSON.stringify(a ?? null) === JSON.stringify(b ?? null);
const isEmpty = (value: unknown): boolean => value === null || value === undefined || value === '' || same(value, {}) || same(value, []);

/** Girths change one level at a time: each level that moved is a line of its own. */
function girthChanges(before: unknown, after: unknown): FieldChange[] {
  if (!Array.isArray(before) || !Array.isArray(after)) return [];
  const [was, is] = [before as unknown[], after as unknown[]];
  return is.flatMap((value, index) =>
    same(was[index], value) ? [] : [{ column: `circumferences_mm.${index}`, label: `girth at level ${index + 1}`, kind: 'length' as const, before: was[index] ?? null, after: value }],
  );
}

const isBareKey = (value: unknown): value is string => typeof value === 'string' && /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(value);

/** Keys of other rows that an image holds: whoever reads the trail looks up what they are called. */
export const bareKeysOf = (...images: readonly Image[]): string[] => images.flatMap((image) => Object.entries(image ?? {}).flatMap(([column, value]) => (!isPlumbing(column) && isBareKey(value) ? [value] : [])));

/** A key by the code of what it names; one that has none says nothing to a reader. */
const inWords = (value: unknown, names: ReadonlyMap<string, string>): unknown => (isBareKey(value) ? (names.get(value) ?? 'a record without a code') : value);

/** What an entry changed, field by field. An insert shows what was first entered; a column the reader cannot use is left out. */
export function changesOf(before: Image, after: Image, names: ReadonlyMap<string, string> = new Map()): FieldChange[] {
  const columns = [...new Set([...Object.keys(before ?? {}), ...Object.keys(after ?? {})])].filter((column) => !isPlumbing(column));
  return columns.flatMap((column) => {
    const [was, is] = [before?.[column] ?? null, after?.[column] ?? null];
    if (same(was, is) || (isEmpty(was) && isEmpty(is))) return [];
    if (column === 'circumferences_mm' && before && after) return girthChanges(was, is);
    const { label, kind } = fieldWords(column);
    return [{ column, label, kind: typeof is === 'object' && is !== null && kind === 'text' ? ('json' as const) : kind, before: inWords(was, names), after: inWords(is, names) }];
  });
}
