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

/** What an entry changed, field by field. An insert shows what was first entered; a column the reader cannot use is left out. */
export function changesOf(before: Image, after: Image): FieldChange[] {
  const columns = [...new Set([...Object.keys(before ?? {}), ...Object.keys(after ?? {})])].filter((column) => !isPlumbing(column));
  return columns.flatMap((column) => {
    const [was, is] = [before?.[column] ?? null, after?.[column] ?? null];
    if (same(was, is) || (isEmpty(was) && isEmpty(is))) return [];
    if (column === 'circumferences_mm' && before && after) return girthChanges(was, is);
    const { label, kind } = fieldWords(column);
    return [{ column, label, kind: typeof is === 'object' && is !== null && kind === 'text' ? ('json' as const) : kind, before: was, after: is }];
  });
}
