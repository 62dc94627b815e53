/** One visit as a definition sees it. `day` is days from the participant's time zero. */
export interface JudgedVisit {
  readonly day: number;
  readonly verdict: 'met' | 'not met' | 'not judged';
  /** Unscheduled visits may show a first occurrence but never confirm one. */
  readonly scheduled: boolean;
}

export interface Occurrence {
  /** Index into the timeline given. */
  readonly index: number;
  readonly day: number;
  /** Onset lies in (after, upTo]; `after` is null when no visit before it was judged and found clear. */
  readonly interval: { readonly after: number | null; readonly upTo: number };
}

/** First visit that meets the definition, in order of day; null when none does. Prevalent cases are the caller's to leave out. */
export function firstOccurrence(timeline: readonly JudgedVisit[]): Occurrence | null {
  return onsetAt(timeline, ordered(timeline).find(({ visit }) => visit.verdict === 'met'));
}

/**
 * First of two consecutive scheduled visits that both meet the definition; onset is the first of the two. A scheduled
 * visit that could not be judged breaks the pair, so a missed measurement never counts as confirmation.
 */
export function sustained(timeline: readonly JudgedVisit[]): Occurrence | null {
  const scheduled = ordered(timeline).filter(({ visit }) => visit.scheduled);
  return onsetAt(timeline, scheduled.find(({ visit }, i) => visit.verdict === 'met' && scheduled[i + 1]?.visit.verdict === 'met'));
}

/** Leaves early swelling out: visits up to and including `days` after surgery are not judged. `surgeryDay` is on the timeline's own scale. */
export function excludeEarly(timeline: readonly JudgedVisit[], { surgeryDay, days }: { surgeryDay: number; days: number }): JudgedVisit[] {
  return timeline.map((visit) => (visit.day - surgeryDay <= days ? { ...visit, verdict: 'not judged' } : visit));
}

/** Leaves out visits within `days` of an episode such as cellulitis (28 by common practice), which swells an arm by itself. */
export function excludeAround(timeline: readonly JudgedVisit[], { episodeDays, days }: { episodeDays: readonly number[]; days: number }): JudgedVisit[] {
  return timeline.map((visit) => (episodeDays.some((episode) => Math.abs(visit.day - episode) <= days) ? { ...visit, verdict: 'not judged' } : visit));
}

type Placed = { readonly visit: JudgedVisit; readonly index: number };

function ordered(timeline: readonly JudgedVisit[]): Placed[] {
  return timeline.map((visit, index) => ({ visit, index })).toSorted((a, b) => a.visit.day - b.visit.day || a.index - b.index);
}

function onsetAt(timeline: readonly JudgedVisit[], onset: Placed | undefined): Occurrence | null {
  if (!onset) return null;
  const clearDays = timeline.filter(({ verdict, day }) => verdict === 'not met' && day < onset.visit.day).map(({ day }) => day);
  return {
    index: onset.index,
    day: onset.visit.day,
    interval: { after: clearDays.length > 0 ? Math.max(...clearDays) : null, upTo: onset.visit.day },
  };
}
