/**
 * Walks the reference results of tests/reference: loads a topic and its data
 * sets, applies the tolerance rules of tests/reference/README.md, and fails
 * for every case that no adapter answers.
 */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';

const root = new URL('../../reference/', import.meta.url);

export interface Tolerance {
  readonly rel: number;
  readonly abs: number;
  /** Part names ('G, correlation', 'exact_*') to their own relative tolerance. */
  readonly override?: Readonly<Record<string, number>>;
}

export interface ReferenceCase {
  readonly id: string;
  readonly estimand: string;
  readonly dataset?: {
    readonly file?: string;
    readonly rows?: string;
    readonly x?: string;
    readonly y?: string;
    readonly columns?: readonly string[];
    readonly rule?: string;
    readonly inline?: Readonly<Record<string, number | readonly number[]>>;
    readonly inline_rows?: unknown;
  };
  readonly params?: Readonly<Record<string, unknown>>;
  readonly call?: string;
  readonly expected: unknown;
  readonly tolerance: Tolerance;
  readonly source?: string;
  readonly note?: string;
}

export interface Topic {
  readonly topic: string;
  readonly title: string;
  readonly count: number;
  readonly cases: readonly ReferenceCase[];
}

/** What an adapter returns is compared with `expected`, part by part; extra parts are ignored. */
export type Adapter = (reference: ReferenceCase) => unknown;

export function readReference(file: string): unknown {
  return JSON.parse(readFileSync(new URL(file, root), 'utf8'));
}

/** @param name file name without '.json', e.g. '03-kaplan-meier' */
export function loadTopic(name: string): Topic {
  const topic = readReference(`${name}.json`) as Topic;
  if (topic.cases.length !== topic.count) throw new Error(`${name}: ${topic.count} cases promised, ${topic.cases.length} there`);
  return topic;
}

/** A data set by columns; cells are text, an empty cell is missing. */
export class Table {
  readonly length: number;
  constructor(private readonly columns: ReadonlyMap<string, readonly string[]>) {
    this.length = [...columns.values()][0]?.length ?? 0;
  }

  get names(): string[] {
    return [...this.columns.keys()];
  }

  text(name: string): readonly string[] {
    const column = this.columns.get(name);
    if (column === undefined) throw new Error(`no column '${name}' among ${this.names.join(', ')}`);
    return column;
  }

  /** Numbers; a missing cell is NaN, TRUE/FALSE are 1/0, any other text throws. */
  numbers(name: string): Float64Array {
    return Float64Array.from(this.text(name), (cell) => {
      if (cell === '') return Number.NaN;
      if (cell === 'TRUE' || cell === 'FALSE') return cell === 'TRUE' ? 1 : 0;
      if (cell === 'Inf') return Number.POSITIVE_INFINITY;
      const value = Number(cell);
      if (Number.isNaN(value)) throw new Error(`'${cell}' in column '${name}' is not a number`);
      return value;
    });
  }

  where(keep: (row: number) => boolean): Table {
    const rows = Array.from({ length: this.length }, (_, row) => row).filter(keep);
    return new Table(new Map([...this.columns].map(([name, cells]) => [name, rows.map((row) => cells[row] as string)])));
  }

  /** Row filters as the cases write them: 'sex = 2', 'inst and ph.ecog not missing'. */
  filter(rule: string): Table {
    const equal = /^(\S+) = (.+)$/.exec(rule);
    if (equal) {
      const column = this.text(equal[1] as string);
      return this.where((row) => column[row] === equal[2]);
    }
    const present = /^(.+) not missing$/.exec(rule);
    if (present) {
      const columns = (present[1] as string).split(' and ').map((name) => this.text(name));
      return this.where((row) => columns.every((column) => column[row] !== ''));
    }
    throw new Error(`row filter not understood: ${rule}`);
  }
}

/** @param file relative to tests/reference, e.g. 'datasets/lung.csv' */
export function loadTable(file: string): Table {
  const lines = readFileSync(new URL(file, root), 'utf8').trimEnd().split(/\r?\n/).map(splitLine);
  const [header = [], ...body] = lines;
  return new Table(new Map(header.map((name, at) => [name, body.map((cells) => (cells[at] === 'NA' ? '' : (cells[at] ?? '')))])));
}

function splitLine(line: string): string[] {
  return line.split(',').map((cell) => cell.replace(/^"(.*)"$/, '$1'));
}

/** The table a case speaks of: its file with its row filter, or its inline columns. */
export function tableOf(reference: ReferenceCase): Table {
  const { file, rows, inline_rows: inline } = reference.dataset ?? {};
  if (file !== undefined) {
    const table = loadTable(file);
    return rows === undefined ? table : table.filter(rows);
  }
  if (inline === undefined || Array.isArray(inline)) throw new Error(`${reference.id} has no columns`);
  const columns = Object.entries(inline as Record<string, readonly (string | number | null)[]>);
  return new Table(new Map(columns.map(([name, cells]) => [name, cells.map((cell) => (cell === null ? '' : String(cell)))])));
}

/** The single numbers a case gives inline, e.g. { x: 81, n: 263 }. */
export function inlineOf(reference: ReferenceCase): Record<string, number> {
  if (reference.dataset?.inline === undefined) throw new Error(`${reference.id} has no inline numbers`);
  return reference.dataset.inline as Record<string, number>;
}

const unreached = /quantile|median|lower|upper|limit|time|se_log|^p?\d+$/i;
const standardError = /(^|_)(se|std_err|standard_error)(_|$)/i;

/**
 * Compares by the rules of the README; answers one sentence a difference.
 * `path` names the part under comparison.
 */
export function differences(got: unknown, want: unknown, tolerance: Tolerance, path: readonly string[] = []): string[] {
  const where = path.join('.') || 'result';
  if (want === null) return isUndefinedNumber(got, path) ? [] : [`${where}: not defined, got ${show(got)}`];
  if (typeof want === 'number' || want === 'Infinity' || want === '-Infinity') {
    return numberDiffers(got, Number(want), tolerance, path) ? [`${where}: got ${show(got)}, want ${want}`] : [];
  }
  if (typeof want !== 'object') return Object.is(got, want) ? [] : [`${where}: got ${show(got)}, want ${show(want)}`];
  if (typeof got !== 'object' || got === null) return [`${where}: got ${show(got)}, want ${show(want)}`];
  if (Array.isArray(want)) {
    const list = got as ArrayLike<unknown>;
    if (list.length !== want.length) return [`${where}: ${list.length} entries, want ${want.length}`];
    return want.flatMap((part, at) => differences(list[at], part, tolerance, [...path, String(at)]));
  }
  return Object.entries(want as object).flatMap(([name, part]) => {
    const own = (got as Record<string, unknown>)[name];
    return own === undefined ? [`${where}: '${name}' is missing`] : differences(own, part, tolerance, [...path, name]);
  });
}

function isUndefinedNumber(got: unknown, path: readonly string[]): boolean {
  if (got === null || Number.isNaN(got)) return true;
  if (got === Number.POSITIVE_INFINITY || got === Number.NEGATIVE_INFINITY) return path.some((part) => unreached.test(part));
  return got === 0 && path.some((part) => standardError.test(part));
}

function numberDiffers(got: unknown, want: number, tolerance: Tolerance, path: readonly string[]): boolean {
  if (typeof got !== 'number' || Number.isNaN(got)) return true;
  if (!Number.isFinite(want) || !Number.isFinite(got)) return got !== want;
  return Math.abs(got - want) > tolerance.abs + relativeFor(tolerance, path) * Math.abs(want);
}

function relativeFor({ rel, override = {} }: Tolerance, path: readonly string[]): number {
  for (const [names, own] of Object.entries(override)) {
    const patterns = names.split(',').map((name) => new RegExp(`^${name.trim().replaceAll('*', '.*')}$`));
    if (path.some((part) => patterns.some((pattern) => pattern.test(part)))) return own;
  }
  return rel;
}

function show(value: unknown): string {
  return typeof value === 'object' ? (JSON.stringify(value)?.slice(0, 120) ?? 'undefined') : String(value);
}

function countLeaves(want: unknown): number {
  if (want === null || typeof want !== 'object') return 1;
  return Object.values(want).reduce((sum: number, part) => sum + countLeaves(part), 0);
}

/** Fails with every difference at once. */
export function expectReference(got: unknown, reference: Pick<ReferenceCase, 'expected' | 'tolerance'>): void {
  expect(countLeaves(reference.expected)).toBeGreaterThan(0);
  expect(differences(got, reference.expected, reference.tolerance)).toEqual([]);
}

/**
 * One test a case. An adapter is named by a case id, by the beginning of ids
 * ('garwood-' for all of them; the longest that fits wins), or by the estimand.
 * A case without an adapter fails; so does an adapter that no case uses.
 */
export function runTopic(name: string, adapters: Readonly<Record<string, Adapter>>, only: (reference: ReferenceCase) => boolean = () => true): void {
  const topic = loadTopic(name);
  const used = new Set<string>();
  describe(`${topic.topic}: ${topic.title}`, () => {
    for (const reference of topic.cases.filter(only)) {
      const key = adapterKey(adapters, reference);
      if (key !== undefined) used.add(key);
      test(reference.id, () => {
        const adapter = key === undefined ? undefined : adapters[key];
        if (adapter === undefined) throw new Error(`no adapter answers ${reference.id}: ${reference.estimand}`);
        expectReference(adapter(reference), reference);
      });
    }
    test('every adapter answers at least one case', () => {
      expect(Object.keys(adapters).filter((key) => !used.has(key))).toEqual([]);
    });
  });
}

function adapterKey(adapters: Readonly<Record<string, Adapter>>, { id, estimand }: ReferenceCase): string | undefined {
  if (estimand in adapters) return estimand;
  return Object.keys(adapters)
    .filter((key) => id.startsWith(key))
    .sort((a, b) => b.length - a.length)[0];
}
