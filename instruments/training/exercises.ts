/** What is lifted with. Kilograms compare only within one kind of equipment; a band has levels, body weight has neither. */
export const equipmentKinds = ['band', 'body weight', 'cable', 'dumbbell', 'machine'] as const;
export type Equipment = (typeof equipmentKinds)[number];

/** What the number on the log means. */
export const loadBases = ['machine setting', 'per hand', 'total'] as const;
export type LoadBasis = (typeof loadBases)[number];

export const sides = ['both', 'left', 'right'] as const;
export type Side = (typeof sides)[number];

export interface Exercise {
  readonly code: string;
  readonly name: string;
  readonly region: 'chest' | 'back' | 'shoulder' | 'arm' | 'leg' | 'trunk';
  /** Loads the arm; held while an arm change waits for the site. */
  readonly isUpperBody: boolean;
  readonly equipment: readonly Equipment[];
  /** The basis offered first for each kind of equipment it allows. */
  readonly basis: LoadBasis;
}

/** Exercises a log may hold, in alphabetical order of code. */
export const exercises = [
  { code: 'biceps-curl', name: 'Biceps curl', region: 'arm', isUpperBody: true, equipment: ['dumbbell', 'cable', 'machine', 'band'], basis: 'per hand' },
  { code: 'calf-raise', name: 'Calf raise', region: 'leg', isUpperBody: false, equipment: ['body weight', 'machine'], basis: 'total' },
  { code: 'chest-press', name: 'Chest press', region: 'chest', isUpperBody: true, equipment: ['dumbbell', 'machine', 'cable', 'band'], basis: 'per hand' },
  { code: 'deadlift', name: 'Deadlift', region: 'back', isUpperBody: true, equipment: ['dumbbell'], basis: 'total' },
  { code: 'lateral-raise', name: 'Lateral raise', region: 'shoulder', isUpperBody: true, equipment: ['dumbbell', 'cable', 'band'], basis: 'per hand' },
  { code: 'leg-press', name: 'Leg press', region: 'leg', isUpperBody: false, equipment: ['machine'], basis: 'machine setting' },
  { code: 'overhead-press', name: 'Overhead press', region: 'shoulder', isUpperBody: true, equipment: ['dumbbell', 'machine', 'band'], basis: 'per hand' },
  { code: 'pull-down', name: 'Pull-down', region: 'back', isUpperBody: true, equipment: ['cable', 'machine', 'band'], basis: 'machine setting' },
  { code: 'seated-row', name: 'Seated row', region: 'back', isUpperBody: true, equipment: ['cable', 'machine', 'dumbbell', 'band'], basis: 'machine setting' },
  { code: 'squat', name: 'Squat', region: 'leg', isUpperBody: false, equipment: ['body weight', 'dumbbell'], basis: 'total' },
  { code: 'triceps-extension', name: 'Triceps extension', region: 'arm', isUpperBody: true, equipment: ['dumbbell', 'cable', 'band'], basis: 'per hand' },
  { code: 'wall-press-up', name: 'Wall press-up', region: 'chest', isUpperBody: true, equipment: ['body weight'], basis: 'total' },
] as const satisfies readonly Exercise[];

export type ExerciseCode = (typeof exercises)[number]['code'];

export function findExercise(code: string): Exercise | undefined {
  return exercises.find((exercise) => exercise.code === code);
}
