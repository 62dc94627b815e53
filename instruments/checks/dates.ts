import { daysBetween, isLocalDate, type LocalDate } from '../calendar';
import { defineEditCheck } from './define-edit-check';

/** A date typed, and the date it is today where the site is. */
export interface DateTyped {
  readonly on: LocalDate;
  readonly todayOn: LocalDate;
}

export const dateInFuture = defineEditCheck<DateTyped>({
  id: 'date.future',
  version: 1,
  severity: 'hard',
  uses: 'this-sitting',
  title: 'No date in the future',
  source: 'A record states what has happened',
  run({ on, todayOn }) {
    if (!isLocalDate(on)) return { message: `‘${on}’ is not a date. Type it as year, month and day, such as 2027-03-03.` };
    return on > todayOn ? { message: `${on} is in the future; today is ${todayOn}. Type the day it happened.` } : null;
  },
  examplePass: { on: '2027-03-03', todayOn: '2027-03-03' },
  exampleFires: { on: '2027-03-04', todayOn: '2027-03-03' },
});

export const dateBeforeConsent = defineEditCheck<{ readonly on: LocalDate; readonly consentedOn: LocalDate }>({
  id: 'date.before-consent',
  version: 1,
  severity: 'hard',
  uses: 'history',
  title: 'No study data before consent',
  source: 'Consent comes before any study procedure (good clinical practice)',
  run: ({ on, consentedOn }) => (on < consentedOn ? { message: `${on} is before consent was given on ${consentedOn}. Check the date; nothing before consent can be study data.` } : null),
  examplePass: { on: '2027-03-03', consentedOn: '2027-03-03' },
  exampleFires: { on: '2027-03-02', consentedOn: '2027-03-03' },
});

/** Dates of one participant; null = not known. */
export interface LifeDates {
  readonly bornOn: LocalDate | null;
  readonly diagnosedOn: LocalDate | null;
  readonly surgeryOn: LocalDate | null;
  readonly baselineOn: LocalDate | null;
  readonly firstSessionOn: LocalDate | null;
  readonly diedOn: LocalDate | null;
}

export type DateOrderFlag = 'BASELINE_AFTER_SURGERY' | 'BIRTH_NOT_FIRST' | 'DEATH_NOT_LAST' | 'SESSION_BEFORE_BASELINE' | 'SURGERY_BEFORE_DIAGNOSIS';

/** Which dates stand in the wrong order. A baseline after surgery is allowed, and its changes are labelled 'not pre-operative'. */
export function dateOrderFlags(dates: LifeDates): DateOrderFlag[] {
  const { bornOn, diagnosedOn, surgeryOn, baselineOn, firstSessionOn, diedOn } = dates;
  const isBefore = (a: LocalDate | null, b: LocalDate | null): boolean => a !== null && b !== null && a < b;
  const others = [diagnosedOn, surgeryOn, baselineOn, firstSessionOn];
  const flags: [boolean, DateOrderFlag][] = [
    [isBefore(surgeryOn, baselineOn), 'BASELINE_AFTER_SURGERY'],
    [others.some((on) => on !== null && bornOn !== null && on <= bornOn), 'BIRTH_NOT_FIRST'],
    [others.some((on) => isBefore(diedOn, on)), 'DEATH_NOT_LAST'],
    [isBefore(firstSessionOn, baselineOn), 'SESSION_BEFORE_BASELINE'],
    [isBefore(surgeryOn, diagnosedOn), 'SURGERY_BEFORE_DIAGNOSIS'],
  ];
  return flags.flatMap(([applies, flag]) => (applies ? [flag] : []));
}

const orderWords: Readonly<Record<DateOrderFlag, string>> = {
  BASELINE_AFTER_SURGERY: 'The baseline was measured after surgery. It stands; changes from it are labelled not pre-operative.',
  BIRTH_NOT_FIRST: 'A date lies on or before the date of birth. Check both.',
  DEATH_NOT_LAST: 'A date lies after the date of death. Check both.',
  SESSION_BEFORE_BASELINE: 'The first training session lies before the baseline. Check both dates.',
  SURGERY_BEFORE_DIAGNOSIS: 'Surgery lies before the diagnosis. Check both dates.',
};

const noDates: LifeDates = { bornOn: null, diagnosedOn: null, surgeryOn: null, baselineOn: null, firstSessionOn: null, diedOn: null };

export const dateOrder = defineEditCheck<LifeDates>({
  id: 'date.order',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Birth, diagnosis, surgery, baseline, training and death in order',
  source: 'common practice; check DQ-21',
  run(dates) {
    const flags = dateOrderFlags(dates);
    return flags.length > 0 ? { message: flags.map((flag) => orderWords[flag]).join(' ') } : null;
  },
  examplePass: { ...noDates, surgeryOn: '2024-03-10', baselineOn: '2024-03-08', firstSessionOn: '2024-05-01' },
  exampleFires: { ...noDates, surgeryOn: '2024-03-10', baselineOn: '2024-03-12', firstSessionOn: '2024-05-01' },
});

const LATE_DAYS = 3;

export const sessionLate = defineEditCheck<{ readonly on: LocalDate; readonly enteredOn: LocalDate }>({
  id: 'session.late',
  version: 1,
  severity: 'hint',
  uses: 'this-sitting',
  title: 'Session entered more than 72 hours later',
  source: 'Paper diaries: 90 % claimed, 11 % real (Stone 2002); electronic entry near the time is the remedy',
  run({ on, enteredOn }) {
    const days = daysBetween({ from: on, to: enteredOn });
    return days > LATE_DAYS ? { message: `This session was ${days} days ago. It will be saved and marked late.`, value: days } : null;
  },
  examplePass: { on: '2027-03-01', enteredOn: '2027-03-04' },
  exampleFires: { on: '2027-03-01', enteredOn: '2027-03-05' },
});
