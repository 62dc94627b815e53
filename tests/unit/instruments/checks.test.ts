import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { lastDigitCounts } from '@/instruments/checks/assessor';
import { girthLimit, girthLimitsMm } from '@/instruments/checks/girth';
import { editChecks } from '@/instruments/checks/index';
import { checkLimbHistory, type SavedAssessment } from '@/instruments/checks/limb-history';
import { checkLimbSitting, checkOpenTrials, combinedGirthsMm, type LimbSitting } from '@/instruments/checks/limb-sitting';
import { weight } from '@/instruments/checks/measured-ranges';
import { checkTrainingEntry } from '@/instruments/checks/training-entry';
import { trialsFarApart } from '@/instruments/checks/trials';
import { FORMULA_VERSION } from '@/instruments/measurement/formula-version';
import { STANDARD_ARM_MAP } from '@/instruments/measurement/map';

/** The arm of check VOL-03 and one a millimetre wider. */
const LEFT = [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296];
const RIGHT = LEFT.map((girth) => girth + 1);
const none: (number | null)[] = LEFT.map(() => null);

function sitting(over: Partial<LimbSitting> = {}): LimbSitting {
  return { map: STANDARD_ARM_MAP, method: 'frustum', left: { first: LEFT, second: LEFT, third: none }, right: { first: RIGHT, second: RIGHT, third: none }, ...over };
}

const idsOf = (findings: readonly { check: string }[]): string[] => findings.map(({ check }) => check);

describe('messages state value, limit and way out', () => {
  test('as the words of the look ask', () => {
    expect(weight.limit.run(741)?.message).toBe('741 kg is over the limit of 250. Was it 74.1?');
    expect(trialsFarApart.run({ firstMm: 258, secondMm: 236 })?.message).toBe('23.6 is 2.2 cm under trial 1. Measure it again, or keep it and say why.');
    expect(girthLimit.run({ girthMm: 102, offsetMm: 320 })?.message).toBe('10.2 cm is under the limit of 16. In inches it would be 25.9 cm. Read the tape again.');
  });

  test('the suggestion is in the same unit as the value', () => {
    expect(girthLimit.run({ girthMm: 2510, offsetMm: 200 })).toMatchObject({ value: 2510, suggestion: 251 });
    expect(weight.limit.run(741)?.suggestion).toBe(74.1);
  });
});

describe('limits', () => {
  test('the ends of usual range and limits are allowed; both ranges widen upward or stay', () => {
    for (const offsetMm of Array.from({ length: 11 }, (_, level) => level * 40)) {
      const { usualMm, limitMm } = girthLimitsMm(offsetMm);
      expect(limitMm[0]).toBeLessThan(usualMm[0]);
      expect(limitMm[1]).toBeGreaterThan(usualMm[1]);
      expect([girthLimit.run({ girthMm: limitMm[0], offsetMm }), girthLimit.run({ girthMm: limitMm[1], offsetMm })]).toEqual([null, null]);
    }
    expect(girthLimitsMm(999)).toEqual(girthLimitsMm(400));
  });

  test('a number in the usual range never fires, in any pair', () => {
    fc.assert(fc.property(fc.double({ min: 40, max: 150, noNaN: true }), (kg) => {
      expect([weight.limit.run(kg), weight.range.run(kg)]).toEqual([null, null]);
    }));
    expect(weight.range.run(741)).toBeNull();
  });
});

describe('a limb sitting', () => {
  test('in order raises nothing', () => {
    expect(checkLimbSitting(sitting())).toEqual([]);
  });

  test('while trials are open only this sitting is looked at, at its own cells', () => {
    const typo = LEFT.with(5, 521);
    const findings = checkOpenTrials(sitting({ left: { first: LEFT, second: typo, third: none } }));
    expect(findings.map(({ check, at }) => [check, at])).toEqual([
      ['girth.limit', { side: 'left', trial: 'second', level: 5 }],
      ['taper.limit', { side: 'left', trial: 'second', level: 5 }],
      ['taper.limit', { side: 'left', trial: 'second', level: 6 }],
      ['trials.far-apart', { side: 'left', trial: 'second', level: 5 }],
    ]);
    const uses = new Map(editChecks.map((check) => [check.id, check.uses]));
    expect(idsOf(findings).every((id) => uses.get(id) === 'this-sitting')).toBe(true);
  });

  test('a third reading answers the call for it', () => {
    const second = LEFT.with(5, 257);
    expect(idsOf(checkOpenTrials(sitting({ left: { first: LEFT, second, third: none } })))).toEqual(['trials.differ']);
    const third = sitting({ left: { first: LEFT, second, third: none.with(5, 256) } });
    expect(checkOpenTrials(third)).toEqual([]);
    expect(combinedGirthsMm(third, 'left')[5]).toBe(256.5);
  });

  test('half filled in says nothing of levels until it is to be complete', () => {
    const half = sitting({ left: { first: [...LEFT.slice(0, 10), null], second: none, third: none } });
    expect(checkOpenTrials(half)).toEqual([]);
    expect(idsOf(checkLimbSitting(half))).toEqual(['arms.levels']);
  });

  test('a level may widen by the limit exactly, and no further', () => {
    const step = (riseMm: number) => idsOf(checkOpenTrials({ ...sitting(), map: { startOffsetMm: 200, stepMm: 40, levels: 2 }, left: { first: [250, 250 + riseMm], second: [null, null], third: [null, null] }, right: { first: [null, null], second: [null, null], third: [null, null] } }));
    expect([step(35), step(36), step(-10), step(-11)]).toEqual([[], ['taper.range'], [], ['taper.range']]);
    expect([step(80), step(81)].map(([first]) => first)).toEqual(['taper.range', 'taper.limit']);
  });

  test('the same arm twice is asked about', () => {
    expect(idsOf(checkLimbSitting(sitting({ right: { first: LEFT, second: LEFT, third: none } })))).toEqual(['arms.identical']);
  });
});

describe('earlier visits', () => {
  const saved = (over: Partial<SavedAssessment> = {}): SavedAssessment => ({
    identity: { method: 'frustum', map: STANDARD_ARM_MAP, deviceId: null, formulaVersion: FORMULA_VERSION },
    leftMm: LEFT,
    rightMm: LEFT.map((girth) => girth + 14),
    leftMl: 1830,
    rightMl: 2050,
    weightKg: 70,
    ...over,
  });
  const run = (now: SavedAssessment, previous: SavedAssessment | null = saved(), baseline: SavedAssessment | null = saved()) =>
    idsOf(checkLimbHistory({ now, previous, baseline, atRiskSide: 'right', daysSincePrevious: 90 }));
  const drift = LEFT.map((girth) => girth + 2);

  test('without any, there is nothing to say', () => {
    expect(run(saved(), null, null)).toEqual([]);
  });

  test('swapped arms, copied girths, drift and weight are asked about', () => {
    expect(run(saved({ leftMm: drift.map((girth) => girth + 14), rightMm: drift }))).toEqual(['arms.swapped']);
    expect(run(saved())).toEqual(['arms.copied-forward']);
    const now = saved({ leftMm: drift });
    expect(run({ ...now, leftMl: 1830 * 1.16 })).toEqual(['unaffected-change.range']);
    expect(run({ ...now, rightMl: 2050 * 1.5 })).toEqual(['at-risk-change.limit']);
    expect(run({ ...now, weightKg: 78 })).toEqual(['weight-change.range']);
  });

  test('another map or method stops the comparison rather than fooling it', () => {
    const map = { ...STANDARD_ARM_MAP, startOffsetMm: 20 };
    const now = saved({ identity: { ...saved().identity, map }, leftMl: 4000 });
    expect(run(now)).toEqual(['method.changed']);
  });
});

describe('a training session', () => {
  const entry = (loadKg: number, reps = 10, basis: 'per hand' | 'machine setting' = 'per hand') => ({ exercise: 'chest-press', equipment: 'dumbbell' as const, basis, side: 'both' as const, sets: [{ reps, loadKg }] });

  test('over 150 kg is not believed; over 20 kg per hand is asked about, on a machine not', () => {
    const of = (entries: ReturnType<typeof entry>[]) => checkTrainingEntry({ entries }, { minutes: 40, effort: 5 });
    expect(of([entry(150.5)])[0]).toMatchObject({ check: 'session-load.limit', severity: 'hard', at: { entry: 0, set: 0 } });
    expect(idsOf(of([entry(21)]))).toEqual(['session-load.range']);
    expect(of([entry(21, 10, 'machine setting')])).toEqual([]);
    expect(idsOf(of([entry(5), entry(5, 101)]))).toEqual(['session-reps.limit']);
    expect(of([entry(5)])).toEqual([]);
  });

  test('effort and minutes have ends', () => {
    expect(idsOf(checkTrainingEntry({ entries: [] }, { minutes: 301, effort: 11 }))).toEqual(['session-minutes.limit', 'session-effort.limit']);
  });
});

test('last digits are counted in millimetres', () => {
  expect(lastDigitCounts([160, 165, 171, 180])).toEqual([2, 1, 0, 0, 0, 1, 0, 0, 0, 0]);
});
