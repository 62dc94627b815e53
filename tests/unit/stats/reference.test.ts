import { describe, expect, test } from 'vitest';
import { differences, loadTable, loadTopic } from './reference';

const tolerance = { rel: 1e-6, abs: 1e-12, override: { 'G, blup': 1e-3, 'exact_*': 1e-2 } };

describe('the reference runner sees what it should', () => {
  test('a number off by more than the tolerance is a difference, by less is none', () => {
    expect(differences({ a: 1 + 2e-6 }, { a: 1 }, tolerance)).toHaveLength(1);
    expect(differences({ a: 1 + 5e-7 }, { a: 1 }, tolerance)).toEqual([]);
  });

  test('overrides apply to the named parts alone', () => {
    expect(differences({ G: [1.0005], exact_x: 1.005, other: 1.0005 }, { G: [1], exact_x: 1, other: 1 }, tolerance)).toHaveLength(1);
  });

  test('null accepts null and NaN, infinity for a limit, zero for a standard error, and nothing else', () => {
    expect(differences({ a: null, b: Number.NaN, upper: Infinity, se: 0 }, { a: null, b: null, upper: null, se: null }, tolerance)).toEqual([]);
    expect(differences({ a: 0, b: Infinity }, { a: null, b: null }, tolerance)).toHaveLength(2);
  });

  test('infinities are numbers, missing parts and short arrays are differences', () => {
    expect(differences({ a: Infinity }, { a: 'Infinity' }, tolerance)).toEqual([]);
    expect(differences({ a: 1e300 }, { a: 'Infinity' }, tolerance)).toHaveLength(1);
    expect(differences({ b: Float64Array.of(1) }, { a: 1, b: [1, 2] }, tolerance)).toHaveLength(2);
  });

  test('row filters read as the cases write them', () => {
    const lung = loadTable('datasets/lung.csv');
    expect(lung.length).toBe(228);
    expect(lung.filter('sex = 2').length).toBe(90);
    expect(lung.filter('inst and ph.ecog not missing').length).toBe(226);
  });

  test('all fourteen topics are here, with every case they promise', () => {
    const names = ['01-proportions', '02-rates', '03-kaplan-meier', '04-competing-risks', '05-interval-censored', '06-cox', '07-mixed-model', '08-progression', '09-glm', '10-reliability', '11-missing-bootstrap-rng', '12-distributions', '13-nist', '14-weak-library'];
    expect(names.reduce((sum, name) => sum + loadTopic(name).cases.length, 0)).toBe(2022);
  });
});
