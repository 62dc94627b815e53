import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { addDays } from '@/instruments/calendar';
import { adviceFor, byUrgency } from '@/instruments/training/advice';
import { allowedLoad } from '@/instruments/training/allowed-load';
import { armChangedBy } from '@/instruments/training/arm-check';
import { armStateOn, judgeDraft, judgeSessions, type TrainingFlag } from '@/instruments/training/judge-sessions';
import { oneRepMax } from '@/instruments/training/measures';
import type { ExerciseEntry, TrainingSession } from '@/instruments/training/session';
import { defaultTrainingSettings } from '@/instruments/training/settings';

const BASELINE = '2024-01-01';

function session(on: string, loadKg: number, over: Partial<TrainingSession> & { entry?: Partial<ExerciseEntry> } = {}): TrainingSession {
  const { entry, ...rest } = over;
  const press: ExerciseEntry = { exercise: 'chest-press', equipment: 'dumbbell', basis: 'per hand', side: 'both', sets: [{ reps: 10, loadKg }], ...entry };
  return { id: on, on, armChanged: false, entries: [press], ...rest };
}

const rulesOf = (flags: readonly TrainingFlag[]): string[] => flags.map(({ rule }) => rule);

describe('judging a log', () => {
  test('does not depend on the order of the rows, and names its flags alike', () => {
    const logs = fc.uniqueArray(fc.record({ day: fc.integer({ min: 1, max: 90 }), half: fc.integer({ min: 1, max: 30 }), changed: fc.constantFrom(true, false, null) }), { selector: ({ day }) => day, minLength: 1, maxLength: 12 });
    fc.assert(fc.property(logs, fc.array(fc.integer({ min: 1, max: 90 }), { maxLength: 3 }), (rows, assessed) => {
      const sessions = rows.map(({ day, half, changed }) => session(addDays(BASELINE, day), half / 2, { armChanged: changed }));
      const assessedOn = assessed.map((day) => addDays(BASELINE, day));
      const flags = judgeSessions(sessions, assessedOn, BASELINE);
      expect(judgeSessions(sessions.toReversed(), assessedOn, BASELINE)).toEqual(flags);
      expect(new Set(flags.map(({ id }) => id)).size).toBe(flags.length);
    }));
  });

  test('warm-up sets, body weight and other machines are not compared', () => {
    const warm = session('2024-01-08', 2, { entry: { sets: [{ reps: 10, loadKg: 9, isWarmUp: true }, { reps: 10, loadKg: 2 }] } });
    expect(judgeSessions([warm], [], BASELINE)).toEqual([]);
    const squat = session('2024-01-08', 0, { entry: { equipment: 'body weight', sets: [{ reps: 10, loadKg: null }] } });
    expect(judgeSessions([squat], [], BASELINE)).toEqual([]);
    const machines = [session('2024-01-08', 2, { entry: { equipment: 'machine', machineId: 'A' } }), session('2024-01-15', 2, { entry: { equipment: 'machine', machineId: 'B' } })];
    expect(judgeSessions(machines, [], BASELINE)).toEqual([]);
  });

  test('bands go up one level a week, and never against kilograms', () => {
    const band = (on: string, bandLevel: number) => session(on, 0, { entry: { equipment: 'band', sets: [{ reps: 10, loadKg: null, bandLevel }] } });
    expect(rulesOf(judgeSessions([band('2024-01-08', 3), band('2024-01-15', 4)], [], BASELINE))).toEqual([]);
    expect(rulesOf(judgeSessions([band('2024-01-08', 1), band('2024-01-15', 3)], [], BASELINE))).toEqual(['STEP_OVER']);
  });

  test('the optional rules speak only when the protocol sets them', () => {
    const log = [session('2024-01-14', 2), session('2024-01-15', 3)];
    expect(judgeSessions(log, [], BASELINE)).toEqual([]);
    const settings = { ...defaultTrainingSettings, minDaysSinceRaise: 6, minSessionsAtLoad: 2 };
    expect(rulesOf(judgeSessions(log, [], BASELINE, settings))).toEqual(['RAISED_EARLY', 'RAISED_SOON']);
    const gap = [session('2024-01-08', 2), session('2024-01-29', 3)];
    expect(rulesOf(judgeSessions(gap, [], BASELINE, { ...defaultTrainingSettings, shortBreakDays: 14 }))).toEqual(['HOLD_OR_REDUCE']);
  });

  test('after a break the jump still counts, the step does not', () => {
    const log = [session('2024-01-08', 2), session('2024-02-05', 7)];
    expect(rulesOf(judgeSessions(log, [], BASELINE))).toEqual(['RESUME_HIGH', 'STEP_HARD']);
  });

  test('where no step of the equipment fits the window after a break, the old load is no deviation but more is', () => {
    const settings = { ...defaultTrainingSettings, incrementKg: 1 };
    const back = (loadKg: number) => rulesOf(judgeSessions([session('2024-01-08', 1), session('2024-02-12', loadKg)], [], BASELINE, settings));
    expect(back(1)).toEqual([]);
    expect(back(2)).toEqual(['RESUME_HIGH']);
  });

  test('an assessment on the day of the change answers it for the sessions after; one before it does not', () => {
    const log = [session('2024-01-08', 2, { armChanged: true }), session('2024-01-11', 2)];
    expect(rulesOf(judgeSessions(log, ['2024-01-08'], BASELINE))).toEqual(['ASSESSMENT_REQUIRED']);
    expect(rulesOf(judgeSessions(log, ['2024-01-07'], BASELINE))).toEqual(['ASSESSMENT_REQUIRED', 'TRAINED_BEFORE_ASSESSMENT']);
  });

  test('an edited session is judged in place of the old one', () => {
    const recorded = [session('2024-01-08', 2), session('2024-01-15', 8)];
    expect(rulesOf(judgeDraft(session('2024-01-15', 4), recorded, [], BASELINE))).toEqual([]);
    expect(rulesOf(judgeDraft(session('2024-01-15', 5), recorded, [], BASELINE))).toEqual(['STEP_OVER']);
  });
});

describe('the load allowed', () => {
  const histories = fc.uniqueArray(fc.record({ day: fc.integer({ min: 1, max: 100 }), half: fc.integer({ min: 1, max: 40 }), changed: fc.constantFrom(false, false, true, null) }), { selector: ({ day }) => day, maxLength: 10 });
  const settingsToTry = fc.constantFrom(defaultTrainingSettings, { ...defaultTrainingSettings, minDaysSinceRaise: 6, minSessionsAtLoad: 2, shortBreakDays: 14 }, { ...defaultTrainingSettings, incrementKg: 1 });

  test('breaks no load rule anywhere up to its end, and does just above it, whatever the arm', () => {
    fc.assert(fc.property(histories, fc.integer({ min: 0, max: 45 }), fc.constantFrom(false, null, true), fc.double({ min: 0, max: 1, noNaN: true }), settingsToTry, (rows, gap, armChanged, share, settings) => {
      const recorded = rows.map(({ day, half, changed }) => session(addDays(BASELINE, day), half / 2, { armChanged: changed }));
      const today = addDays(BASELINE, 101 + gap);
      const state = armStateOn({ on: today, armChanged }, recorded, []);
      const allowed = allowedLoad(recorded.map(({ on, entries }) => ({ on, load: entries[0]?.sets[0]?.loadKg ?? 0 })), today, state, settings);
      // What the arm asks for by itself, and what is only information, no load can change.
      const flagged = (loadKg: number): string[] =>
        rulesOf(judgeDraft(session(today, loadKg, { armChanged }), recorded, [], BASELINE, settings).filter(({ key, severity }) => key !== null && severity !== 'information'));
      expect(flagged(allowed.fromKg + (allowed.upToKg - allowed.fromKg) * share)).toEqual([]);
      expect(flagged(allowed.proposedKg)).toEqual([]);
      expect(allowed.proposedKg).toBeLessThanOrEqual(allowed.upToKg + 1e-9);
      expect(flagged(allowed.upToKg + settings.incrementKg + 0.01)).not.toEqual([]);
    }), { numRuns: 500 });
  });

  test('reads as the phone shows it', () => {
    const allowed = allowedLoad([{ on: '2027-02-24', load: 6 }], '2027-03-03', 'clear');
    expect(allowed).toMatchObject({ lastKg: 6, upToKg: 8, proposedKg: 6, hold: false, basis: 'new week' });
    expect(allowed.why).toBe('Your arm is unchanged, so you may add up to 2 kg. Staying at 6 is fine too.');
  });

  test('first, same week, after a break, unknown arm and changed arm each say why', () => {
    expect(allowedLoad([], '2024-01-08', 'clear')).toMatchObject({ lastKg: null, upToKg: 2, proposedKg: 1, basis: 'first session' });
    expect(allowedLoad([{ on: '2024-01-08', load: 2 }], '2024-01-10', 'clear')).toMatchObject({ upToKg: 2, basis: 'same week' });
    expect(allowedLoad([{ on: '2024-03-25', load: 8 }], '2024-04-22', 'clear')).toMatchObject({ fromKg: 4, upToKg: 6.4, proposedKg: 5, basis: 'after a break' });
    expect(allowedLoad([{ on: '2024-01-08', load: 2 }], '2024-01-15', 'unknown')).toMatchObject({ upToKg: 2, hold: false });
    expect(allowedLoad([{ on: '2024-01-08', load: 2 }], '2024-01-15', 'waiting')).toMatchObject({ upToKg: 2, hold: true, basis: 'held' });
    expect(allowedLoad([{ on: '2024-01-08', load: 2 }], '2024-01-15', 'changed').why).toContain('Hold your training');
  });

  test('a light day lowers the ceiling, for a large jump counts from the last session', () => {
    const history = [{ on: '2024-01-08', load: 6 }, { on: '2024-01-11', load: 2 }];
    expect(allowedLoad(history, '2024-01-15', 'clear').upToKg).toBe(6.5);
  });
});

describe('advice', () => {
  const adviceOn = (sessions: TrainingSession[]) => byUrgency(judgeSessions(sessions, [], BASELINE)).map((flag) => adviceFor(flag));

  test('on 3 kg more than last week reads as the phone shows it', () => {
    const [advice] = adviceOn([session('2024-01-08', 2), session('2024-01-15', 4), session('2024-01-22', 6), session('2024-01-29', 9)]);
    expect(advice).toEqual({
      title: 'That is 3 kg more than last week',
      text: 'The study’s rule is at most 2 kg more from one week to the next, and only if the arm is unchanged. Smaller steps give you time to notice a change.',
      safeLoadKg: 8,
      changeLabel: 'Change to 8 kg',
      keepLabel: 'I have already lifted 9 kg',
      note: 'If you have lifted it, say so: the log should be true. Your site will see it.',
      contactSite: false,
    });
  });

  test('on a jump of 5 kg asks the person to be in touch, and still keeps the true load', () => {
    const [advice] = adviceOn([session('2024-01-08', 2), session('2024-01-15', 7)]);
    expect(advice).toMatchObject({ title: 'That is 5 kg more than last time', safeLoadKg: 4, keepLabel: 'I have already lifted 7 kg', contactSite: true });
  });

  test('every rule has words, without diagnosis or blame', () => {
    const odd = { ...defaultTrainingSettings, shortBreakDays: 14, minDaysSinceRaise: 6, minSessionsAtLoad: 2 };
    const logs = [
      [session('2024-01-08', 3)],
      [session('2024-01-08', 2), session('2024-01-10', 3)],
      [session('2024-01-08', 2), session('2024-01-15', 3, { armChanged: true }), session('2024-01-22', 3)],
      [session('2024-01-08', 2), session('2024-01-15', 3, { armChanged: null })],
      [session('2024-01-08', 2), session('2024-01-15', 5), session('2024-01-22', 12)],
      [session('2024-01-08', 8), session('2024-02-12', 8), session('2024-03-18', 2)],
      [session('2024-01-08', 2), session('2024-01-29', 3), session('2024-02-05', 4)],
      [session('2024-01-14', 2), session('2024-01-15', 3)],
    ];
    const flags = logs.flatMap((log) => judgeSessions(log, [], log === logs[0] ? null : BASELINE, odd));
    expect(new Set(rulesOf(flags)).size).toBe(14);
    for (const flag of flags) {
      const { title, text, safeLoadKg } = adviceFor(flag, odd);
      expect(`${title} ${text}`).not.toMatch(/undefined|NaN|null|!|lymph|wrong|fail/i);
      if (safeLoadKg !== null) expect(safeLoadKg).toBeLessThanOrEqual(flag.facts?.load ?? 0);
    }
  });
});

describe('small facts of training', () => {
  test('the arm check: unsure is unknown, not clear', () => {
    expect([armChangedBy('same'), armChangedBy('a-little'), armChangedBy('clearly'), armChangedBy('not-sure'), armChangedBy(null)]).toEqual([false, true, true, null, null]);
  });

  test('one-repetition maximum does not exist from 37 repetitions by Brzycki, and refuses nonsense', () => {
    expect(oneRepMax({ loadKg: 2, reps: 37 }).brzyckiKg).toBeNull();
    expect(() => oneRepMax({ loadKg: 2, reps: 0 })).toThrow(RangeError);
    expect(() => oneRepMax({ loadKg: 0, reps: 5 })).toThrow(RangeError);
  });
});
