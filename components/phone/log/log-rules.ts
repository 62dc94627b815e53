import { armChangedBy, type ArmCheckAnswer } from '@/instruments/training/arm-check';
import { byUrgency } from '@/instruments/training/advice';
import { allowedLoad, type AllowedLoad } from '@/instruments/training/allowed-load';
import type { ArmState, PastLoad } from '@/instruments/training/define-training-rule';
import { armStateOn, judgeDraft, type TrainingFlag } from '@/instruments/training/judge-sessions';
import { historyKey, workingLoad } from '@/instruments/training/session';
import { KG_PER_LB } from '@/instruments/units';
import { toExerciseEntry, type LoggedSetInput } from '@/lib/training/input';
import type { LogView } from '@/lib/training/view-log';

export type ArmWords = 'the same' | 'a little fuller' | 'clearly fuller' | 'not sure';

/** The arm check in the record's words, beside the code the rules know. */
export const armCodes: Readonly<Record<ArmWords, ArmCheckAnswer>> = { 'the same': 'same', 'a little fuller': 'a-little', 'clearly fuller': 'clearly', 'not sure': 'not-sure' };

export const armChanged = (armCheck: ArmWords | null): boolean | null => armChangedBy(armCheck === null ? null : armCodes[armCheck]);

/** What is known of the arm on the day of the session. */
export const armState = (view: LogView, on: string, armCheck: ArmWords | null): ArmState => armStateOn({ on, armChanged: armChanged(armCheck) }, view.recorded, view.assessmentsOn);

/** Earlier working loads of the same exercise, equipment, basis and side. */
function pastOf(view: LogView, set: LoggedSetInput): PastLoad[] {
  const key = historyKey(set);
  return view.recorded.flatMap(({ on, entries }) =>
    entries.flatMap((entry) => {
      const load = historyKey(entry) === key ? workingLoad(entry) : null;
      return load === null ? [] : [{ on, load }];
    }),
  );
}

/** What the rules allow of an exercise on the day. */
export const allowedFor = (view: LogView, set: LoggedSetInput, on: string, arm: ArmState): AllowedLoad => allowedLoad(pastOf(view, set), on, arm, view.settings);

/** The gravest thing the rules say of one exercise before it is saved; null when they say nothing. */
export function flagFor(view: LogView, set: LoggedSetInput, on: string, armCheck: ArmWords | null): TrainingFlag | null {
  const draft = { id: 'draft', on, armChanged: armChanged(armCheck), entries: [toExerciseEntry(set)] };
  const flags = judgeDraft(draft, view.recorded, view.assessmentsOn, view.baselineOn, view.settings);
  return byUrgency(flags.filter(({ facts, severity }) => facts !== null && severity !== 'information'))[0] ?? null;
}

/** Kilograms that would be last time's load, had they been pounds: within 6 %. Common practice, no source. */
export function looksLikePounds({ typed, unit }: Pick<LoggedSetInput, 'typed' | 'unit'>, lastKg: number | null): boolean {
  return unit === 'kg' && lastKg !== null && lastKg > 0 && Math.abs(typed * KG_PER_LB - lastKg) <= 0.06 * lastKg;
}
