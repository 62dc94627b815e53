/** Everything the tide chart draws, as plain data. Days are `yyyy-mm-dd`; changes are percent of the baseline ratio. */
export interface TideData {
  /** The participant code. */
  code: string;
  /** 'Left against right, change from baseline, %', in up to three lines. */
  armWords: readonly string[];
  /** First and last day of the time axis. */
  from: string;
  to: string;
  today: string;
  visits: readonly TideVisit[];
  /** Half-width of the measurement-error band, percent. */
  errorPercent: number;
  /** High water: the case threshold. `words` follow its name, as 'a case if the next visit confirms it'. */
  threshold: { percent: number; words: string };
  symptoms: readonly TideSymptom[];
  /** Names of the exercises, heaviest drawn first; the three fills are solid, hatched, open. */
  exercises: readonly string[];
  weeks: readonly TideWeek[];
  pauses: readonly { from: string; to: string; words: readonly string[] }[];
  /** Words that hang under a week, past the rule: 'chest press +3 kg in a week, site called'. */
  callouts: readonly { week: string; words: string }[];
  /** Heaviest of the last week, per exercise, at the line's end. */
  latest: readonly { exercise: string; loadKg: number }[];
}

export interface TideVisit {
  key: string;
  /** 'Baseline', 'Month 3', 'Extra'. */
  name: string;
  /** Day it took place; null while it is to come. */
  on: string | null;
  /** Under the name: the date, 'in progress today', 'opens 19 May'. */
  dateWords: string;
  changePercent: number | null;
  /** The two trials' own changes; their span is the upright through the diamond. */
  trialsPercent?: readonly [number, number];
  provisional?: boolean;
  window?: { opens: string; target: string; closes: string };
  impedanceRatio?: number | null;
}

export interface TideSymptom {
  on: string;
  /** At most two short lines: 'heaviness 6,' 'arm fuller'. */
  words: readonly string[];
  /** How many signs were reported: the height of the stroke, 10 at most. */
  signCount: number;
}

export interface TideWeek {
  /** The Monday. */
  starts: string;
  /** Weight times lifts in the week, kg, in the order of `exercises`. */
  loadsKg: readonly number[];
}
