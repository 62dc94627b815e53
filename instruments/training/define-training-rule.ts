import type { LocalDate } from '../calendar';
import type { TrainingSettings } from './settings';

export type TrainingRuleCode =
  | 'ASSESSMENT_REQUIRED'
  | 'BASELINE_MISSING'
  | 'HOLD_OR_REDUCE'
  | 'RAISED_EARLY'
  | 'RAISED_SOON'
  | 'RAISED_WITHIN_WEEK'
  | 'RAISE_ARM_UNKNOWN'
  | 'RAISE_WITHOUT_CLEAR_ARM'
  | 'RESUME_HIGH'
  | 'RESUME_LOW'
  | 'START_HIGH'
  | 'STEP_HARD'
  | 'STEP_OVER'
  | 'TRAINED_BEFORE_ASSESSMENT';

/** What is known of the arm at a session. `waiting` = an earlier 'yes' that no assessment has answered yet. */
export type ArmState = 'clear' | 'changed' | 'unknown' | 'waiting';

/** A session as the whole-session rules see it. */
export interface SessionFacts {
  readonly on: LocalDate;
  readonly isFirst: boolean;
  readonly baselineOn: LocalDate | null;
  readonly armChanged: boolean | null;
  /** An earlier 'yes' still waits for its assessment. */
  readonly isWaiting: boolean;
}

/** One earlier session of the same history, newest last. */
export interface PastLoad {
  readonly on: LocalDate;
  readonly load: number;
}

/** A load as the load rules see it, with the history it belongs to. `load` is kilograms, or a level for bands. */
export interface LoadFacts {
  readonly load: number;
  readonly isBand: boolean;
  readonly on: LocalDate;
  readonly arm: ArmState;
  /** Earlier sessions of the key, oldest first; empty at the first. */
  readonly past: readonly PastLoad[];
  readonly previous: PastLoad | null;
  readonly gapDays: number | null;
  /** The break is long enough for the resume rule. */
  readonly isAfterBreak: boolean;
  /** First load of the key in this ISO week before this session; null when this is the week's first. */
  readonly firstLoadThisWeek: number | null;
  /** Heaviest load in the key's last active ISO week before this one. */
  readonly lastWeekMax: number | null;
}

interface RuleText {
  readonly code: TrainingRuleCode;
  readonly title: string;
  /** `information` asks nothing; `advice` is for the participant; `deviation` is a candidate for the site to judge; `safety` comes first. */
  readonly severity: 'information' | 'advice' | 'deviation' | 'safety';
}

export type TrainingRule =
  | (RuleText & { readonly scope: 'session'; applies(facts: SessionFacts, settings: TrainingSettings): boolean; readonly examples: { readonly passes: SessionFacts; readonly fires: SessionFacts } })
  | (RuleText & { readonly scope: 'load'; applies(facts: LoadFacts, settings: TrainingSettings): boolean; readonly examples: { readonly passes: LoadFacts; readonly fires: LoadFacts } });

/** Types a training rule; the registry in `index.ts` lists it. Flags are candidates for the site, never a diagnosis. */
export function defineTrainingRule(rule: TrainingRule): TrainingRule {
  return rule;
}
