import { describe, expect, test } from 'vitest';
import { impedanceCutoffs } from '@/instruments/measurement/impedance-ratio';
import { differences, referenceChecks } from './reference';
import { handlers } from './reference-handlers';

/** Kinds that the statistics answer for, named one by one so that a new kind cannot hide among them. */
const answeredByStatistics = new Set([
  'bland_altman',
  'cumulative_incidence_competing',
  'icc',
  'incidence_rate',
  'kaplan_meier',
  'km_loglog_ci',
  'logrank',
  'max_sem_for_threshold',
  'p_from_ci',
  'person_time',
  'published_agreement',
  'published_incidence_by_definition',
  'published_pooled_incidence',
  'rate_ratio',
  'rvc_false_positive',
  'sdc_from_sem',
  'sem_from_icc',
  'single_proportion',
  'technical_error_of_measurement',
  'two_proportions',
]);

const checks = referenceChecks();
const ours = checks.filter(({ kind }) => !answeredByStatistics.has(kind));

describe('the clinical check values', () => {
  test('every kind is answered for, here or by the statistics', () => {
    const orphans = checks.map(({ kind }) => kind).filter((kind) => !answeredByStatistics.has(kind) && !(kind in handlers));
    expect(orphans).toEqual([]);
    expect(checks).toHaveLength(215);
  });

  test('no handler outlives its kind', () => {
    const kinds = new Set(checks.map(({ kind }) => kind));
    expect(Object.keys(handlers).filter((kind) => !kinds.has(kind))).toEqual([]);
  });

  test.each(ours.map((check) => [check.id, check] as const))('%s', (_id, { kind, inputs, expected, tolerance }) => {
    const actual = handlers[kind]?.(inputs, expected);
    expect(differences(actual, expected, tolerance)).toEqual([]);
  });

  test('the stored cut-offs are those the sources print or imply', () => {
    const bounds = checks.find(({ kind }) => kind === 'bioimpedance_norm')?.expected;
    expect(impedanceCutoffs['2018-2sd'].dominant).toBe(bounds?.cut_2sd);
    expect(impedanceCutoffs['2018-3sd'].nonDominant).toBe(bounds?.cut_3sd);
    const ward = checks.find(({ id }) => id === 'BIS-09')?.expected;
    expect([impedanceCutoffs['2011-2sd'].dominant, impedanceCutoffs['2011-2sd'].nonDominant]).toEqual([ward?.cut_2sd_dominant, ward?.cut_2sd_nondominant]);
  });

  test('the comparison itself can fail', () => {
    expect(differences({ a: 1 }, { a: 1.1 }, 0.01)).toHaveLength(1);
    expect(differences({ a: [1, 2] }, { a: [1] }, 0.01)).toHaveLength(1);
    expect(differences({}, { a: null }, 0)).toHaveLength(1);
  });
});
