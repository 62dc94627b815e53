import type { LocalDate } from '../calendar';
import type { ArmState, LoadFacts, PastLoad, SessionFacts, TrainingRule, TrainingRuleCode } from './define-training-rule';
import { trainingRules } from './index';
import { loadFacts } from './load-facts';
import { historyKey, type TrainingSession, workingLoad } from './session';
import { defaultTrainingSettings, type TrainingSettings } from './settings';

/** A candidate deviation for the site and advice for the participant. `id` stays the same when sessions are judged again. */
export interface TrainingFlag {
  /** rule, history and session; whole-session rules have no history. */
  readonly id: string;
  readonly rule: TrainingRuleCode;
  readonly severity: TrainingRule['severity'];
  readonly sessionId: string;
  readonly on: LocalDate;
  /** Exercise, equipment, basis and side; null for whole-session rules. */
  readonly key: string | null;
  /** The load and its history at the time of judging; null for whole-session rules. */
  readonly facts: LoadFacts | null;
}

/**
 * Judges every session of one participant by every rule.
 *
 * `sessions` in any order (same-day sessions keep the order given), `assessmentsOn` the dates on which both arms were
 * measured, `baselineOn` the date of the complete baseline or null. Pure: judging again after an edit yields the same
 * ids, so the caller can tell flags that stand, fell or are new. Semantics: checks LOAD-01 to LOAD-23.
 */
export function judgeSessions(
  sessions: readonly TrainingSession[],
  assessmentsOn: readonly LocalDate[],
  baselineOn: LocalDate | null,
  settings: TrainingSettings = defaultTrainingSettings,
): TrainingFlag[] {
  const ordered = sessions.toSorted((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
  const histories = new Map<string, PastLoad[]>();
  let changedOn: LocalDate | null = null;
  return ordered.flatMap((session, i) => {
    const isWaiting = changedOn !== null && isOpen({ changedOn, on: session.on, assessmentsOn });
    const facts: SessionFacts = { on: session.on, isFirst: i === 0, baselineOn, armChanged: session.armChanged, isWaiting };
    const flags = [...judgeWhole(session, facts, settings), ...judgeLoads(session, armStateOf(facts), histories, settings)];
    if (session.armChanged) changedOn = session.on;
    return flags;
  });
}

/** The flags one session not yet saved would raise after those already recorded. */
export function judgeDraft(
  draft: TrainingSession,
  recorded: readonly TrainingSession[],
  assessmentsOn: readonly LocalDate[],
  baselineOn: LocalDate | null,
  settings: TrainingSettings = defaultTrainingSettings,
): TrainingFlag[] {
  const others = recorded.filter((session) => session.id !== draft.id);
  return judgeSessions([...others, draft], assessmentsOn, baselineOn, settings).filter((flag) => flag.sessionId === draft.id);
}

/** Whether a 'yes' of `changedOn` still waits on the day `on`: no assessment from that day up to now. */
function isOpen({ changedOn, on, assessmentsOn }: { changedOn: LocalDate; on: LocalDate; assessmentsOn: readonly LocalDate[] }): boolean {
  return !assessmentsOn.some((assessedOn) => assessedOn >= changedOn && assessedOn <= on);
}

function armStateOf({ armChanged, isWaiting }: SessionFacts): ArmState {
  if (armChanged) return 'changed';
  if (isWaiting) return 'waiting';
  return armChanged === false ? 'clear' : 'unknown';
}

/**
 * What is known of the arm on a day, before a session: the answer given now, and whether an earlier 'yes' still waits
 * for its assessment. `armChanged` null = not answered yet.
 */
export function armStateOn(
  { on, armChanged }: { on: LocalDate; armChanged: boolean | null },
  recorded: readonly TrainingSession[],
  assessmentsOn: readonly LocalDate[],
): ArmState {
  const changedOn = recorded.filter((session) => session.armChanged && session.on <= on).map((session) => session.on).toSorted().at(-1);
  const isWaiting = changedOn !== undefined && isOpen({ changedOn, on, assessmentsOn });
  return armStateOf({ on, armChanged, isWaiting, isFirst: false, baselineOn: null });
}

function judgeWhole(session: TrainingSession, facts: SessionFacts, settings: TrainingSettings): TrainingFlag[] {
  return trainingRules
    .filter((rule) => rule.scope === 'session' && rule.applies(facts, settings))
    .map((rule) => flagOf(rule, session, null, null));
}

function judgeLoads(session: TrainingSession, arm: ArmState, histories: Map<string, PastLoad[]>, settings: TrainingSettings): TrainingFlag[] {
  return [...workingLoads(session)].flatMap(([key, { load, isBand }]) => {
    const past = histories.get(key) ?? [];
    const facts = loadFacts({ load, isBand, on: session.on, arm, past: [...past] }, settings);
    histories.set(key, [...past, { on: session.on, load }]);
    return trainingRules
      .filter((rule) => rule.scope === 'load' && rule.applies(facts, settings))
      .map((rule) => flagOf(rule, session, key, facts));
  });
}

/** One working load per history and session: entries of the same exercise count as one, by their heaviest set. */
function workingLoads(session: TrainingSession): Map<string, { load: number; isBand: boolean }> {
  const loads = new Map<string, { load: number; isBand: boolean }>();
  for (const entry of session.entries) {
    const key = historyKey(entry);
    const load = workingLoad(entry);
    if (load === null) continue;
    loads.set(key, { load: Math.max(load, loads.get(key)?.load ?? load), isBand: entry.equipment === 'band' });
  }
  return loads;
}

function flagOf(rule: TrainingRule, session: TrainingSession, key: string | null, facts: LoadFacts | null): TrainingFlag {
  return { id: [rule.code, key ?? '', session.id].join('/'), rule: rule.code, severity: rule.severity, sessionId: session.id, on: session.on, key, facts };
}
