import { daysBetween, type LocalDate } from '../calendar';
import { printKg } from '../numbers';
import { roundKg } from '../units';
import type { ArmState, LoadFacts, PastLoad } from './define-training-rule';
import { lastRaiseOn, loadFacts, resumeWindow, sessionsAtLoad } from './load-facts';
import { defaultTrainingSettings, type TrainingSettings } from './settings';

/** What the stepper shows before a load is chosen. */
export interface AllowedLoad {
  /** The last session's load; null at the first. */
  readonly lastKg: number | null;
  readonly lastOn: LocalDate | null;
  /** Heaviest load of the last active week, which a raise is measured from; null at the first session. */
  readonly lastWeekKg: number | null;
  /** Lightest load of the window after a break; otherwise 0. */
  readonly fromKg: number;
  /** Heaviest load that raises no flag. */
  readonly upToKg: number;
  /** Where the stepper starts: never above last time, and nothing is recorded until it is touched. */
  readonly proposedKg: number;
  /** The arm has changed or waits to be measured: ask the person to hold their training. */
  readonly hold: boolean;
  readonly basis: 'first session' | 'after a break' | 'same week' | 'new week' | 'held';
  /** One or two plain sentences for the person. */
  readonly why: string;
}

/**
 * The load one history allows today. `history` holds the earlier sessions of one exercise, equipment, basis and side in
 * kilograms, in any order; bands and body weight are not asked here. Any load from `fromKg` to `upToKg` is clear of every
 * rule but the information ones.
 */
export function allowedLoad(
  history: readonly PastLoad[],
  today: LocalDate,
  arm: ArmState,
  settings: TrainingSettings = defaultTrainingSettings,
): AllowedLoad {
  const past = history.filter((session) => session.on <= today).toSorted((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
  const facts = loadFacts({ load: 0, isBand: false, on: today, arm, past }, settings);
  if (facts.previous === null) return atStart(arm, settings);
  if (facts.isAfterBreak) return afterBreak(facts, facts.previous, settings);
  return facts.firstLoadThisWeek === null ? newWeek(facts, facts.previous, settings) : sameWeek(facts, facts.previous, facts.firstLoadThisWeek, settings);
}

const isHeld = (arm: ArmState): boolean => arm === 'changed' || arm === 'waiting';
const HOLD = 'Your arm has changed. Hold your training until your site has seen it.';

function answer(facts: LoadFacts | null, arm: ArmState, rest: Pick<AllowedLoad, 'fromKg' | 'upToKg' | 'proposedKg' | 'basis' | 'why'>): AllowedLoad {
  const hold = isHeld(arm);
  return {
    lastKg: facts?.previous?.load ?? null,
    lastOn: facts?.previous?.on ?? null,
    lastWeekKg: facts?.lastWeekMax ?? facts?.previous?.load ?? null,
    hold,
    ...rest,
    upToKg: roundKg(rest.upToKg),
    ...(hold && { basis: 'held' as const, why: HOLD }),
  };
}

function atStart(arm: ArmState, settings: TrainingSettings): AllowedLoad {
  const why = `This is your first time. Start at ${printKg(settings.startFromKg)} to ${printKg(settings.startKg)} kg; lighter is fine too.`;
  return answer(null, arm, { fromKg: 0, upToKg: settings.startKg, proposedKg: Math.min(settings.startFromKg, settings.startKg), basis: 'first session', why });
}

function afterBreak(facts: LoadFacts, previous: PastLoad, settings: TrainingSettings): AllowedLoad {
  const { fromKg, toKg, isFeasible } = resumeWindow(previous.load, settings);
  const weeks = Math.floor((facts.gapDays ?? 0) / 7);
  const upToKg = Math.min(isFeasible ? toKg : previous.load, belowJump(previous, settings));
  const why = isFeasible
    ? `You had ${weeks} weeks off this. Start again between ${printKg(fromKg)} and ${printKg(toKg)} kg.`
    : `You had ${weeks} weeks off this. No weight fits between ${printKg(fromKg)} and ${printKg(toKg)} kg, so lift ${printKg(previous.load)} kg with fewer lifts.`;
  const middle = Math.max(fromKg, onStep((fromKg + toKg) / 2, settings));
  return answer(facts, facts.arm, { fromKg: isFeasible ? fromKg : 0, upToKg, proposedKg: roundKg(isFeasible ? middle : previous.load), basis: 'after a break', why });
}

function sameWeek(facts: LoadFacts, previous: PastLoad, firstKg: number, settings: TrainingSettings): AllowedLoad {
  const upToKg = Math.min(firstKg, belowJump(previous, settings));
  const why = `You began this week at ${printKg(firstKg)} kg. Stay there until next week, or go lighter.`;
  return answer(facts, facts.arm, { fromKg: 0, upToKg, proposedKg: Math.min(previous.load, upToKg), basis: 'same week', why });
}

function newWeek(facts: LoadFacts, previous: PastLoad, settings: TrainingSettings): AllowedLoad {
  const weekKg = facts.lastWeekMax ?? previous.load;
  const waitReason = reasonNotToRaise(facts, weekKg, settings);
  const stepKg = waitReason === null ? settings.weeklyStepKg : 0;
  const ceilingKg = isShortBreak(facts, settings) ? previous.load : weekKg + stepKg;
  const upToKg = Math.min(ceilingKg, belowJump(previous, settings));
  const why = waitReason ?? `Your arm is unchanged, so you may add up to ${printKg(settings.weeklyStepKg)} kg. Staying at ${printKg(weekKg)} is fine too.`;
  return answer(facts, facts.arm, { fromKg: 0, upToKg, proposedKg: Math.min(previous.load, upToKg), basis: 'new week', why });
}

/** Why this week's load should not rise, in the participant's words; null when it may. */
function reasonNotToRaise(facts: LoadFacts, weekKg: number, settings: TrainingSettings): string | null {
  const { minDaysSinceRaise, minSessionsAtLoad, breakDays: withinDays } = settings;
  const stay = `Stay at ${printKg(weekKg)} kg or lighter`;
  if (facts.arm !== 'clear') return `${stay} until you have answered the arm check.`;
  if (isShortBreak(facts, settings)) return `You had ${facts.gapDays} days off this. Stay at ${printKg(facts.previous?.load ?? weekKg)} kg or go lighter this time.`;
  const raisedOn = lastRaiseOn(facts.past, withinDays);
  if (minDaysSinceRaise !== null && raisedOn !== null && daysBetween({ from: raisedOn, to: facts.on }) < minDaysSinceRaise) {
    return `${stay}: you went up less than ${minDaysSinceRaise} days ago.`;
  }
  if (minSessionsAtLoad !== null && sessionsAtLoad(facts.past, { load: weekKg, on: facts.on, withinDays }) < minSessionsAtLoad) {
    return `${stay} until you have lifted it in ${minSessionsAtLoad} sessions.`;
  }
  return null;
}

function isShortBreak({ gapDays }: LoadFacts, { shortBreakDays }: TrainingSettings): boolean {
  return shortBreakDays !== null && gapDays !== null && gapDays >= shortBreakDays;
}

/** A large jump is counted from the last session, so after a light day the ceiling is lower than the week's. */
function belowJump(previous: PastLoad, { jumpKg, incrementKg }: TrainingSettings): number {
  return previous.load + jumpKg - incrementKg;
}

function onStep(kg: number, { incrementKg }: TrainingSettings): number {
  return Math.floor(kg / incrementKg + 1e-9) * incrementKg;
}
