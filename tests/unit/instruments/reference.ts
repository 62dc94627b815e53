import { readFileSync } from 'node:fs';

export interface ReferenceCheck {
  readonly id: string;
  readonly kind: string;
  readonly inputs: Record<string, unknown>;
  readonly expected: Record<string, unknown>;
  readonly tolerance: number;
}

/** The clinical check values: computed by an independent program or published; see each entry's `source`. */
export function referenceChecks(): ReferenceCheck[] {
  return JSON.parse(readFileSync(new URL('../../reference/clinical-checks.json', import.meta.url), 'utf8')) as ReferenceCheck[];
}

/** Walks `expected`; numbers within tolerance, everything else exact. Returns the paths that differ. */
export function differences(actual: unknown, expected: unknown, tolerance: number, path = ''): string[] {
  if (typeof expected === 'number') {
    return typeof actual === 'number' && Math.abs(actual - expected) <= Math.max(tolerance, 0) + 1e-12 ? [] : [`${path}: ${String(actual)} is not ${expected}`];
  }
  if (Array.isArray(expected)) {
    if (!Array.isArray(actual) || actual.length !== expected.length) return [`${path}: ${JSON.stringify(actual)} is not ${JSON.stringify(expected)}`];
    return expected.flatMap((item, i) => differences(actual[i], item, tolerance, `${path}[${i}]`));
  }
  if (expected !== null && typeof expected === 'object') {
    const held = (actual ?? {}) as Record<string, unknown>;
    return Object.entries(expected).flatMap(([key, value]) => differences(held[key], value, tolerance, `${path}.${key}`));
  }
  return Object.is(actual, expected) ? [] : [`${path}: ${JSON.stringify(actual)} is not ${JSON.stringify(expected)}`];
}
