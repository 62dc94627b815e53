import type { LocalDate } from '../calendar';
import { roundKg } from '../units';
import type { Equipment, LoadBasis, Side } from './exercises';

export interface TrainingSet {
  readonly reps: number;
  /** Kilograms; for bands null. */
  readonly loadKg: number | null;
  /** Ordinal level of a band; otherwise absent or null. */
  readonly bandLevel?: number | null;
  readonly isWarmUp?: boolean;
}

export interface ExerciseEntry {
  readonly exercise: string;
  readonly equipment: Equipment;
  readonly basis: LoadBasis;
  readonly side: Side;
  /** Machine settings compare only within one machine. */
  readonly machineId?: string | null;
  readonly sets: readonly TrainingSet[];
}

export interface TrainingSession {
  readonly id: string;
  /** Date in the participant's zone. */
  readonly on: LocalDate;
  /** 'Has your arm changed since the last session?'; null = not answered, or not sure. */
  readonly armChanged: boolean | null;
  readonly entries: readonly ExerciseEntry[];
}

/** One history per exercise, equipment, basis and side (and machine): only like is compared with like. */
export function historyKey({ exercise, equipment, basis, side, machineId }: Omit<ExerciseEntry, 'sets'>): string {
  return [exercise, equipment, basis, side, ...(machineId ? [machineId] : [])].join('|');
}

/** The heaviest set that was not warm-up: kilograms, or a band's level. Null when nothing was loaded (body weight). */
export function workingLoad(entry: ExerciseEntry): number | null {
  if (entry.equipment === 'body weight') return null;
  const loads = entry.sets
    .filter((set) => !set.isWarmUp)
    .map((set) => (entry.equipment === 'band' ? (set.bandLevel ?? null) : set.loadKg))
    .filter((load) => load !== null);
  return loads.length === 0 ? null : roundKg(Math.max(...loads));
}
