import { lowerFirst } from '@/instruments/words';
import type { ParticipantView, ParticipantVisit } from '@/lib/participants/view-participant';
import { mondayOf } from '@/instruments/calendar';
import type { TideData, TideVisit } from '../chart/tide-data';
import { dayNumber, dayOf } from '../chart/days';
import { daysBetween, formatChange, formatDate, formatNearDate } from '../ui/format';

/** Exercises the chart can tell apart by fill. */
const fills = 3;
const daysAhead = 120;
/** Time ahead, at least, as a share of the time gone. */
const roomShare = 0.14;
const monthFirst = (day: string): string => `${day.slice(0, 7)}-01`;
const later = (day: string, days: number): string => dayOf(dayNumber(day) + days);
const other = 'Other';

/** Change in percent; a complete baseline is zero by definition. */
const changePercentOf = ({ key, rvc, state, leftVolumeMl }: ParticipantVisit): number | null =>
  rvc !== null ? rvc * 100 : key === 'baseline' && state === 'complete' && leftVolumeMl !== null ? 0 : null;

function tideVisit(visit: ParticipantVisit, today: string): TideVisit {
  const { id, name, doneOn, state, opensOn, targetOn, closesOn, trials, impedanceRatio, key } = visit;
  const dateWords = doneOn !== null ? (state === 'in progress' && doneOn === today ? 'in progress today' : formatDate(doneOn)) : state === 'missed' ? 'missed' : opensOn > today ? `opens ${formatDate(opensOn)}` : closesOn < today ? 'not done' : `until ${formatNearDate(closesOn)}`;
  return {
    key: id,
    name,
    on: doneOn,
    dateWords,
    changePercent: changePercentOf(visit),
    ...(trials ? { trialsPercent: [trials[0] * 100, trials[1] * 100] as const } : {}),
    provisional: state === 'in progress',
    ...(key === 'extra' ? {} : { window: { opens: opensOn, target: targetOn, closes: closesOn } }),
    impedanceRatio,
  };
}

/** Stretches of weeks without a session that reach the protocol's break, up to today. */
function pausesOf({ weeks, breakDays, today }: ParticipantView): TideData['pauses'] {
  const starts = [...weeks.map(({ starts: start }) => start), today];
  return starts.slice(1).flatMap((next, index) => {
    const from = later(starts[index] ?? next, 7);
    const off = Math.floor(daysBetween(from, next) / 7);
    return off * 7 >= breakDays ? [{ from, to: later(from, off * 7 - 1), words: [`${off} weeks`, 'off'] }] : [];
  });
}

/** Names of the exercises lifted, the most lifted first, and what each week holds of them; beyond the third they stand together. */
function loadsOf({ exercises, weeks }: ParticipantView): Pick<TideData, 'exercises' | 'weeks' | 'latest'> {
  const codes = [...new Set(weeks.flatMap(({ loads }) => Object.keys(loads)))];
  const total = (code: string): number => weeks.reduce((sum, { loads }) => sum + (loads[code] ?? 0), 0);
  const ranked = codes.sort((a, b) => total(b) - total(a));
  const own = ranked.length > fills ? ranked.slice(0, fills - 1) : ranked;
  const rest = ranked.slice(own.length);
  const nameOf = (code: string): string => exercises.find((exercise) => exercise.code === code)?.name ?? code;
  const last = weeks.at(-1);
  return {
    exercises: [...own.map(nameOf), ...(rest.length > 0 ? [other] : [])],
    weeks: weeks.map(({ starts, loads }) => ({
      starts,
      loadsKg: [...own.map((code) => loads[code] ?? 0), ...(rest.length > 0 ? [rest.reduce((sum, code) => sum + (loads[code] ?? 0), 0)] : [])].map(Math.round),
    })),
    latest: own.flatMap((code) => (last?.heaviestKg[code] === undefined ? [] : [{ exercise: nameOf(code), loadKg: last.heaviestKg[code] }])),
  };
}

/** Long words are broken once, so that they fit over the stroke. */
function twoLines(text: string): string[] {
  const first = text.split(/[,;]/)[0] ?? text;
  return [first.length > 26 ? `${first.slice(0, 24).trimEnd()}…` : first];
}

/** The record of one participant as the tide chart draws it. Ratios become percent. */
export function tideOf(view: ParticipantView): TideData {
  const { code, facts, today, visits, threshold, errorPoints, symptoms, flags } = view;
  const [arm, against] = facts.affectedSide === 'left' ? ['Left', 'right'] : ['Right', 'left'];
  const from = monthFirst(facts.enrolledOn);
  const lastWindow = visits.reduce((day, { closesOn }) => (closesOn > day ? closesOn : day), today);
  const wanted = later(today, daysAhead);
  const windows = wanted < lastWindow ? wanted : later(lastWindow, 14);
  // What was lifted last is written in the time ahead, so that never shrinks to nothing.
  const room = later(today, Math.round(daysBetween(from, today) * roomShare));
  const to = monthFirst(later(windows > room ? windows : room, 31));
  return {
    code,
    armWords: [`${arm} against ${against},`, 'change from', 'baseline, %'],
    from,
    to,
    today,
    visits: visits.filter(({ doneOn, targetOn }) => (doneOn ?? targetOn) < to && (doneOn ?? targetOn) >= from).map((visit) => tideVisit(visit, today)),
    errorPercent: errorPoints,
    threshold: { percent: threshold.percent, words: `a case by the definition ${threshold.name}` },
    symptoms: symptoms.filter(({ on }) => on >= from).map(({ on, said, signCount }) => ({ on, signCount, words: twoLines(lowerFirst(said)) })),
    ...loadsOf(view),
    pauses: pausesOf(view),
    callouts: flags.slice(-2).map(({ on, title, exercise }) => ({ week: mondayOf(on), words: exercise ? `${exercise}: ${title.toLowerCase()}` : title.toLowerCase() })),
  };
}

/** The last measured change with its visit, or null before the baseline. */
export function lastChange(view: ParticipantView): { visit: ParticipantVisit; changePercent: number } | null {
  const measured = view.visits.flatMap((visit) => {
    const changePercent = changePercentOf(visit);
    return changePercent === null || visit.doneOn === null ? [] : [{ visit, changePercent }];
  });
  return measured.at(-1) ?? null;
}

/** 'left arm below high water'. */
export function armStanding(view: ParticipantView): string {
  const last = lastChange(view);
  if (!last) return 'not measured yet';
  const arm = `${view.facts.affectedSide} arm`;
  return last.changePercent >= view.threshold.percent ? `${arm} at or above high water` : `${arm} below high water`;
}

/** The chart in one sentence. */
export function tideFinding(view: ParticipantView): string {
  const last = lastChange(view);
  if (!last) return 'No arm has been measured yet; the chart begins with the baseline.';
  const { visit, changePercent } = last;
  return `The ${view.facts.affectedSide} arm stood at ${formatChange(changePercent / 100)} from baseline at ${visit.name} on ${formatDate(visit.doneOn ?? visit.targetOn)}${visit.state === 'in progress' ? ', provisional' : ''}, ${changePercent >= view.threshold.percent ? 'at or above' : 'below'} high water (${view.threshold.percent} %).`;
}
