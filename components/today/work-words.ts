import type { TodayKind } from '@/lib/today/input';
import type { WorkItem } from '@/lib/today/kinds';
import type { ConsentWork } from '@/lib/today/kinds/consent';
import type { QueryWork } from '@/lib/today/kinds/query';
import type { QuestionWork } from '@/lib/today/kinds/questionnaire';
import type { ReportWork } from '@/lib/today/kinds/report';
import type { VisitWork } from '@/lib/today/kinds/visit';
import type { WeekWindow } from '../chart/week-axis';
import { countOf, daysBetween, formatAge, formatDate, formatDue, formatNearDate, formatTime } from '../ui/format';
import type { GaugeState } from '../ui/gauge';

/** What one row of the work list says. */
export interface WorkWords {
  readonly when: string;
  readonly whenDetail: string;
  readonly late: boolean;
  readonly kind: string;
  readonly codeHref: string;
  readonly title: string;
  readonly detail: string;
  readonly window: WeekWindow;
  readonly state: { readonly state: GaugeState; readonly word: string; readonly level?: number };
  readonly verb: string;
  readonly href: string;
  /** The one thing under way: its verb is a button. */
  readonly primary?: boolean;
}

/** What the person may do: a verb that would be refused is not offered. */
export interface WorkMay {
  readonly book: boolean;
  readonly review: boolean;
  readonly countersign: boolean;
}

/** The kinds of work as the tabs name them, in their order. */
export const kindLabels: Readonly<Record<TodayKind, string>> = { all: 'All', visit: 'Visits', report: 'Reports', query: 'Queries', consent: 'Consents', questionnaire: 'Questions' };

const shortDay = (day: string): string => formatDate(day).replace(/ \d{4}$/, '');
const sayDay = (item: WorkItem): string => (item.group === 'late' ? shortDay(item.dueOn) : formatNearDate(item.dueOn));
const participantHref = (code: string): string => `/participants/${code}`;
const sentence = (text: string): string => (/[.?!]$/.test(text) ? text : `${text}.`);

function visitWhen(item: VisitWork): { when: string; whenDetail: string; late: boolean } {
  const { state, bookedAt, bookedOn, today, closesOn, timeZone } = item;
  const time = bookedAt === null ? null : formatTime(new Date(bookedAt), timeZone);
  if (state === 'in progress') return { when: bookedOn === today && time ? time : 'Today', whenDetail: 'under way', late: false };
  if (item.group === 'late') return { when: sayDay(item), whenDetail: formatDue(closesOn, today), late: true };
  const left = daysBetween(today, closesOn);
  const closes = left === 0 ? 'last day' : left <= 3 ? `closes in ${countOf(left, 'day')}` : `closes ${shortDay(closesOn)}`;
  if (bookedOn === today && time) return { when: time, whenDetail: 'booked', late: false };
  return { when: sayDay(item), whenDetail: bookedOn !== null && bookedOn < today ? `booked ${shortDay(bookedOn)}` : closes, late: bookedOn === null && left <= 3 };
}

function visitState({ state, group, bookedOn, today, closesOn, formsDone, formsOf }: VisitWork): WorkWords['state'] {
  if (state === 'in progress') return { state: 'part', level: formsDone / formsOf, word: `${formsDone} of ${formsOf} forms` };
  if (group === 'late') return { state: 'needs', level: 0.05, word: 'Not done' };
  if (bookedOn === null) return daysBetween(today, closesOn) <= 3 ? { state: 'needs', level: 0.05, word: 'Not booked' } : { state: 'empty', word: 'Not booked' };
  if (bookedOn < today) return { state: 'needs', level: 0.05, word: 'Not begun' };
  return formsDone > 0 ? { state: 'part', level: formsDone / formsOf, word: `${formsDone} of ${formsOf} forms` } : { state: 'empty', word: 'Booked' };
}

function visitDetail({ state, group, bookedAt, bookedOn, today, opensOn, closesOn, targetOn, timeZone, formsDone, formsOf }: VisitWork): string {
  if (state === 'in progress') return `Begun, ${countOf(formsOf - formsDone, 'form')} still to finish.`;
  if (group === 'late') return bookedOn === null ? 'Not done, window closed with no booking.' : `Not done, was booked for ${shortDay(bookedOn)}.`;
  if (bookedAt !== null && bookedOn !== null)
    return bookedOn < today ? `Was booked for ${shortDay(bookedOn)} and has not begun.` : `Booked ${formatTime(new Date(bookedAt), timeZone)}${formsDone > 0 ? `, ${countOf(formsDone, 'form')} in` : ''}.`;
  if (opensOn > today) return `Window opens ${shortDay(opensOn)}, no booking yet.`;
  return targetOn < today ? `Target was ${shortDay(targetOn)}; window closes ${shortDay(closesOn)}, not booked.` : 'Window is open, not booked.';
}

function visitWords(item: VisitWork, may: WorkMay): WorkWords {
  const { code, id, name, group, state, bookedOn, opensOn, targetOn, closesOn } = item;
  const verb = state === 'in progress' ? 'Continue' : !may.book ? 'Open' : group === 'late' ? 'Give the reason' : bookedOn === null ? 'Book' : 'Open';
  return {
    ...visitWhen(item),
    kind: 'Visit',
    codeHref: participantHref(code),
    title: name,
    detail: visitDetail(item),
    window: { opens: opensOn, target: targetOn, closes: closesOn, ...(bookedOn === null ? {} : { appointment: bookedOn }), settled: state === 'in progress' },
    state: visitState(item),
    verb,
    href: `/participants/${code}/visits/${id}`,
    ...(state === 'in progress' ? { primary: true } : {}),
  };
}

function queryWords(item: QueryWork): WorkWords {
  const { code, dueOn, today, group, visitName, fieldLabel, question, raisedOn, number, visitId } = item;
  return {
    when: sayDay(item),
    whenDetail: group === 'today' ? 'last day' : formatDue(dueOn, today),
    late: group === 'late',
    kind: 'Query',
    codeHref: participantHref(code),
    title: visitName ? `${visitName}, ${fieldLabel}` : fieldLabel,
    detail: `${question ? `${sentence(question)} ` : ''}Asked ${shortDay(raisedOn)}, Q-${number.padStart(4, '0')}.`,
    window: { opens: raisedOn, closes: dueOn },
    state: { state: 'needs', word: 'Yours to answer' },
    verb: 'Answer',
    href: visitId ? `/participants/${code}/visits/${visitId}` : '/queries',
  };
}

function reportWords(item: ReportWork, may: WorkMay): WorkWords {
  const { id, code, said, state, holdTraining, today, dueOn, group, reportedOn, timeZone } = item;
  const due = formatTime(new Date(item.dueAt), timeZone);
  return {
    when: dueOn === today ? `by ${due}` : sayDay(item),
    whenDetail: group === 'late' ? (dueOn === today ? 'time has run out' : formatDue(dueOn, today)) : `by ${due}`,
    late: group === 'late',
    kind: 'Report',
    codeHref: participantHref(code),
    title: said,
    detail: `Said ${shortDay(reportedOn)}.${holdTraining ? ' Training held until reviewed.' : ''}`,
    window: { opens: reportedOn, closes: dueOn },
    state: state === 'new' ? { state: 'needs', level: 0.1, word: 'Not yet read' } : { state: 'needs', level: 0.5, word: 'Read, not reviewed' },
    verb: may.review ? 'Review' : 'Open',
    href: `/safety/${id}`,
  };
}

function consentWords(item: ConsentWork, may: WorkMay, now: string): WorkWords {
  const { screeningId, signedAt, mode, timeZone, today } = item;
  return {
    when: 'Today',
    whenDetail: `signed ${formatAge(new Date(signedAt), new Date(now))}`,
    late: false,
    kind: 'Consent',
    codeHref: `/screening/${screeningId}`,
    title: 'Second signature',
    detail: `Signed ${mode === 'home' ? 'at home' : mode === 'paper' ? 'on paper' : 'on the tablet'} ${formatNearDate(new Date(signedAt), timeZone)}; enrolment waits on it.`,
    window: { neededBy: today },
    state: { state: 'needs', level: 0.7, word: 'Yours to sign' },
    verb: may.countersign ? 'Sign' : 'Open',
    href: `/screening/${screeningId}`,
  };
}

function questionWords(item: QuestionWork): WorkWords {
  const { code, names, dueOn, opensOn, closesOn, today } = item;
  return {
    when: sayDay(item),
    whenDetail: formatDue(dueOn, today),
    late: true,
    kind: 'Questions',
    codeHref: participantHref(code),
    title: names.length === 1 ? (names[0] ?? '') : countOf(names.length, 'questionnaire'),
    detail: `${names.length === 1 ? 'Not submitted' : names.join(', ')}; taken until ${shortDay(closesOn)}.`,
    window: { opens: opensOn, target: dueOn, closes: closesOn },
    state: { state: 'waiting', word: 'With the participant' },
    verb: 'Call',
    href: participantHref(code),
  };
}

/** A piece of work in words, with its address. */
export function workWords(item: WorkItem, may: WorkMay, now: string): WorkWords {
  switch (item.kind) {
    case 'visit':
      return visitWords(item, may);
    case 'query':
      return queryWords(item);
    case 'report':
      return reportWords(item, may);
    case 'consent':
      return consentWords(item, may, now);
    case 'questionnaire':
      return questionWords(item);
  }
}
