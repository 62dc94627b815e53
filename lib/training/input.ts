import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';
import { equipmentKinds, loadBases, sides } from '@/instruments/training/exercises';
import type { ExerciseEntry } from '@/instruments/training/session';
import { massToKg, roundKg } from '@/instruments/units';

const effort = z.int().min(0).max(10).nullable();

/** One line of the log: an exercise at one load, so many lifts in a row, so many times. */
export const loggedSetInput = z.strictObject({
  exercise: z.string().max(40),
  equipment: z.enum(equipmentKinds),
  basis: z.enum(loadBases),
  side: z.enum(sides),
  /** As typed, in `unit`; for a band its level, for body weight 0. */
  typed: z.number().min(0, 'A load is zero or more.').multipleOf(0.01, 'Give a load to two decimals at most.'),
  unit: z.enum(['kg', 'lb']),
  repetitions: z.int().min(1, 'Lifts in a row are 1 or more.').max(100, 'Lifts in a row are 100 or fewer.'),
  setCount: z.int().min(1, 'Sets are 1 or more.').max(20, 'Sets are 20 or fewer.'),
  effort,
  /** Said on the advice sheet: the load beyond the rule was lifted before the log was opened. */
  alreadyLifted: z.boolean(),
});
export type LoggedSetInput = z.infer<typeof loggedSetInput>;

export const logSessionInput = z.strictObject({
  /** Made once per session on the device: sent twice, it is one session. */
  clientKey: z.uuid(),
  on: calendarDay('Give the day on which you trained.'),
  armCheck: z.enum(['the same', 'a little fuller', 'clearly fuller', 'not sure'], { error: 'Answer the arm check first.' }),
  soreness: z.enum(['no', 'a little', 'a lot'], { error: 'Say whether you are sore since last time.' }),
  effort,
  note: z.string().trim().max(500, 'Use at most 500 characters.').nullable(),
  sets: z.array(loggedSetInput).min(1, 'Log at least one exercise.').max(40),
});
export type LogSessionInput = z.infer<typeof logSessionInput>;

export const flagIdInput = z.strictObject({ id: z.uuid() });

/** A logged line in the rules' own shape. The load comes from what was typed, converted exactly, not from whole grams. */
export function toExerciseEntry({ exercise, equipment, basis, side, typed, unit, repetitions, setCount }: Omit<LoggedSetInput, 'effort' | 'alreadyLifted'>): ExerciseEntry {
  const loadKg = equipment === 'band' || equipment === 'body weight' ? null : roundKg(massToKg(typed, unit));
  const set = equipment === 'band' ? { reps: repetitions, loadKg, bandLevel: typed } : { reps: repetitions, loadKg };
  return { exercise, equipment, basis, side, sets: Array.from({ length: setCount }, () => set) };
}
