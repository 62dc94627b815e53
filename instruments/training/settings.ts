/** Every number of the training rules; a protocol version holds one of these. */
export interface TrainingSettings {
  /** Highest load of an exercise's first session. */
  readonly startKg: number;
  /** Lowest sensible first load; what the stepper proposes. */
  readonly startFromKg: number;
  /** Most that may be added from one ISO week to the next. */
  readonly weeklyStepKg: number;
  /** A rise of this much at once is a large jump, whatever the gap. */
  readonly jumpKg: number;
  /** Days without the exercise that make a break. */
  readonly breakDays: number;
  /** After a break, load lies between these fractions of the load before it. */
  readonly resumeFromFraction: number;
  readonly resumeToFraction: number;
  /** Forgiven on the start and weekly limits; 0.3 lets 5 lb dumbbells pass. */
  readonly toleranceKg: number;
  /** Smallest step of the equipment, for proposals and for windows no step falls into. */
  readonly incrementKg: number;
  /** Advise holding after this many days off; null = not used. */
  readonly shortBreakDays: number | null;
  /** Days between one raise and the next; null = not used. */
  readonly minDaysSinceRaise: number | null;
  /** Sessions at a load before it is raised; null = not used. */
  readonly minSessionsAtLoad: number | null;
}

/**
 * The practice rules as the study is asked to follow them: start at 1–2 kg, at most 2 kg more a week, never 5 kg at
 * once, 20–50 % lower after four weeks off. Common practice, no source; every number is a protocol setting.
 */
export const defaultTrainingSettings: TrainingSettings = {
  startKg: 2,
  startFromKg: 1,
  weeklyStepKg: 2,
  jumpKg: 5,
  breakDays: 28,
  resumeFromFraction: 0.5,
  resumeToFraction: 0.8,
  toleranceKg: 0,
  incrementKg: 0.5,
  shortBreakDays: null,
  minDaysSinceRaise: null,
  minSessionsAtLoad: null,
};

/** Loads within this are one load. */
export const LOAD_EPSILON_KG = 1e-6;
