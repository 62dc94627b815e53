import { kgToLb } from '@/instruments/units';
import type { LoggedSetInput } from '@/lib/training/input';
import type { LogExercise, LogView } from '@/lib/training/view-log';
import { allowedFor, armState, type ArmWords } from './log-rules';

/** One exercise while it is being logged. */
export interface DraftSet extends LoggedSetInput {
  readonly name: string;
  readonly state: 'open' | 'done' | 'left out';
  /** The figure was set by hand; until then it is a proposal. */
  readonly isTouched: boolean;
}

export interface Draft {
  readonly on: string;
  readonly armCheck: ArmWords | null;
  readonly soreness: 'no' | 'a little' | 'a lot' | null;
  readonly note: string;
  readonly sets: readonly DraftSet[];
}

export const startDraft = (view: LogView): Draft => ({ on: view.today, armCheck: null, soreness: null, note: '', sets: view.exercises.map((exercise) => startSet(view, exercise)) });

function startSet(view: LogView, { code, name, equipment, basis }: LogExercise): DraftSet {
  const last = view.last[code];
  return {
    exercise: code,
    name,
    equipment: last?.equipment ?? equipment[0] ?? 'dumbbell',
    basis: last?.basis ?? basis,
    side: last?.side ?? 'both',
    typed: 0,
    unit: last?.unit ?? 'kg',
    repetitions: last?.repetitions ?? 10,
    setCount: last?.setCount ?? 2,
    effort: null,
    alreadyLifted: false,
    state: 'open',
    isTouched: false,
  };
}

const pounds = (kg: number): number => Math.max(1, Math.floor(kgToLb(kg) + 1e-9));

/** Puts a proposal in the open, untouched figures: never above last time. */
export function propose(view: LogView, draft: Draft): Draft {
  const arm = armState(view, draft.on, draft.armCheck);
  return { ...draft, sets: draft.sets.map((set) => (set.isTouched || set.state === 'done' ? set : { ...set, typed: proposalFor(view, set, draft.on, arm) })) };
}

export function proposalFor(view: LogView, set: DraftSet, on: string, arm: ReturnType<typeof armState>): number {
  const last = view.last[set.exercise];
  if (set.equipment === 'body weight') return 0;
  if (set.equipment === 'band') return last?.equipment === 'band' ? last.typed : 1;
  const { proposedKg, lastKg } = allowedFor(view, set, on, arm);
  // Last time's own figure where it is the proposal: 11 lb stays 11 lb.
  const isSame = last !== undefined && last.unit === set.unit && last.equipment === set.equipment && last.side === set.side && lastKg !== null && Math.abs(proposedKg - lastKg) < 1e-6;
  if (isSame) return last.typed;
  return set.unit === 'lb' ? pounds(proposedKg) : proposedKg;
}

/** A safe load in the unit in use. */
export const inUnit = (kg: number, unit: 'kg' | 'lb'): number => (unit === 'lb' ? pounds(kg) : kg);

/** The parts of a draft that are sent. */
export function toInput(draft: Draft, clientKey: string): Record<string, unknown> {
  return {
    clientKey,
    on: draft.on,
    armCheck: draft.armCheck,
    soreness: draft.soreness,
    effort: Math.max(...draft.sets.map(({ effort, state }) => (state === 'done' ? (effort ?? 0) : 0))) || null,
    note: draft.note.trim() || null,
    sets: draft.sets.filter(({ state }) => state === 'done').map(({ name: _name, state: _state, isTouched: _touched, ...set }) => set),
  };
}
