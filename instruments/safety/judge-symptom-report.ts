import { type ReportedSign, reportedSigns, type SignGroup, type SymptomReportAnswers } from './symptom-report';

/** Levels in the order they are acted on, the gravest first. */
export const safetyLevels = ['R1+', 'R3', 'R2', 'R1', 'R4', 'S3', 'S1', 'S2', 'S0'] as const;
export type SafetyLevel = (typeof safetyLevels)[number];

/** The site's clock, counted from the server's time of the report. Protocols may set other figures. */
export type SiteDeadline = { readonly hours: number } | { readonly workingDays: number } | { readonly days: number };

export interface SafetyVerdict {
  readonly level: SafetyLevel;
  /** Shown at once, without waiting for the site. */
  readonly participantTitle: string;
  readonly participantText: string;
  readonly urgency: 'emergency now' | 'same-day care' | 'contact the site' | 'none';
  /** By when the site must have reviewed it; null when nothing is asked of the site. */
  readonly siteDeadline: SiteDeadline | null;
  /** By when both arms must have been measured; null when not asked. */
  readonly measureWithin: SiteDeadline | null;
  readonly siteText: string;
  readonly holdTraining: boolean;
  /** Opens an adverse event form. */
  readonly adverseEvent: 'none' | 'adverse' | 'assess as serious';
}

/** Said with every symptom report: a promise of monitoring would have to be staffed. */
export const NOT_WATCHED = 'Nobody reads reports around the clock. If you feel in danger, do not wait for us.';

const NOTHING: Omit<SafetyVerdict, 'level' | 'participantTitle' | 'participantText' | 'siteText'> = {
  urgency: 'none',
  siteDeadline: null,
  measureWithin: null,
  holdTraining: false,
  adverseEvent: 'none',
};
const EMERGENCY = { urgency: 'emergency now', siteDeadline: { hours: 1 }, measureWithin: null, holdTraining: true, adverseEvent: 'assess as serious' } as const;

/** Text and clocks by level. Signs and clocks from the study's safety table; where it says 'at once' one hour is set here, and four for 'same day', both to be set by protocol. */
const verdicts: Readonly<Record<SafetyLevel, SafetyVerdict>> = {
  'R1+': {
    level: 'R1+',
    participantTitle: 'Call your local emergency number now',
    participantText: `These can be signs of a serious infection that cannot wait. Say that you have had treatment for breast cancer and that lymph nodes may have been removed. Do not train. ${NOT_WATCHED}`,
    siteText: 'Signs of sepsis were reported. Phone at once; assess as a serious adverse event.',
    ...EMERGENCY,
  },
  R3: {
    level: 'R3',
    participantTitle: 'Call your local emergency number now',
    participantText: `Shortness of breath or chest pain needs help now. Do not train and do not drive yourself. ${NOT_WATCHED}`,
    siteText: 'Breathlessness or chest pain was reported. Phone at once; assess as a serious adverse event.',
    ...EMERGENCY,
  },
  R2: {
    level: 'R2',
    participantTitle: 'Get emergency care today',
    participantText: `Sudden swelling, or an arm that turns blue, can be a blood clot. It needs a scan the same day. Do not train, and do not put on a new sleeve or bandage. ${NOT_WATCHED}`,
    siteText: 'Possible clot: phone at once. Ultrasound the same day; no exercise and no new compression until a clot is excluded or treated.',
    ...EMERGENCY,
  },
  R1: {
    level: 'R1',
    participantTitle: 'Get medical care today',
    participantText: `A hot, red or sore arm can be an infection, with or without fever. You may need antibiotics today. Do not train. Chills, confusion, fast breathing or fainting: call your local emergency number. ${NOT_WATCHED}`,
    urgency: 'same-day care',
    siteDeadline: { hours: 4 },
    measureWithin: null,
    siteText: 'Possible infection of the arm: phone the same day, adverse event form within 24 hours, serious if admitted. Measure 2 to 4 weeks after antibiotics end and mark the interval.',
    holdTraining: true,
    adverseEvent: 'adverse',
  },
  R4: {
    level: 'R4',
    participantTitle: 'Your team should see this soon',
    participantText: `Contact your clinic within two working days about this new change. Hold your training for that arm until they have seen it. ${NOT_WATCHED}`,
    urgency: 'contact the site',
    siteDeadline: { workingDays: 2 },
    measureWithin: null,
    siteText: 'New lump, skin nodules, numbness, weakness, or pain at rest: arrange clinical review for recurrence.',
    holdTraining: true,
    adverseEvent: 'adverse',
  },
  S3: {
    level: 'S3',
    ...NOTHING,
    participantTitle: 'Pause lifting with that arm',
    participantText: `The measurement shows a larger change in your arm. Pause lifting with it until a clinician has looked at it. ${NOT_WATCHED}`,
    urgency: 'contact the site',
    siteDeadline: { workingDays: 5 },
    siteText: 'RVC of 10 % or more, 5 points or more since the last visit, or grade 2 or above: clinician review within 5 working days and an adverse event form.',
    holdTraining: true,
    adverseEvent: 'adverse',
  },
  S1: {
    level: 'S1',
    ...NOTHING,
    participantTitle: 'Please hold your training until we call',
    participantText: `Do not lift with your arms until your site has seen the change. Hot, red, suddenly swollen, or fever? Do not wait for a call: get urgent care now. ${NOT_WATCHED}`,
    urgency: 'contact the site',
    siteDeadline: { workingDays: 1 },
    measureWithin: { days: 7 },
    siteText: 'A change in the arm was reported: contact within 1 working day, measure both arms, then decide resume, reduce or refer.',
    holdTraining: true,
  },
  S2: {
    level: 'S2',
    ...NOTHING,
    participantTitle: 'We will measure again',
    participantText: 'The measurement is near a line the study watches. One measurement can be off by as much, so your site will measure again on another day.',
    siteDeadline: { days: 14 },
    measureWithin: { days: 14 },
    siteText: 'RVC from 5 to under 10 %, or impedance ratio above the cut-off: confirm on a second day within 14 days; refer to a lymphoedema therapist within 4 weeks.',
  },
  S0: {
    level: 'S0',
    ...NOTHING,
    participantTitle: 'Sore muscles are common for a few days',
    participantText: `Stay at the same load until the soreness is gone. A fuller, heavier or tighter arm is not soreness: report it if it is still there tomorrow. ${NOT_WATCHED}`,
    siteText: 'Soreness after training, or a change that passed within the day. Nothing to do unless it is reported again.',
  },
};

/** Text and clocks of a level. */
export function safetyVerdict(level: SafetyLevel): SafetyVerdict {
  return verdicts[level];
}

/**
 * Level of a symptom report. Errs towards the graver: an unanswered 'over a day?' counts as yes, sudden swelling alone counts as a
 * possible clot, and sore muscles beyond 7 days, or not only the trained ones, count as a change. Returns null when nothing was reported. Not a diagnosis.
 */
export function judgeSymptomReport(answers: SymptomReportAnswers): SafetyVerdict | null {
  const level = levelOf(answers);
  if (level === null) return null;
  return level === 'S1' && needsEarlyMeasurement(answers) ? { ...verdicts.S1, measureWithin: { days: 3 } } : verdicts[level];
}

function levelOf({ signs, lastedOverADay, soreness }: SymptomReportAnswers): SafetyLevel | null {
  const groups = new Set(signs.map(groupOf));
  if (groups.has('very ill')) return 'R1+';
  if (groups.has('breath')) return 'R3';
  if (groups.has('clot')) return 'R2';
  if (groups.has('infection')) return 'R1';
  if (groups.has('new finding')) return 'R4';
  if (signs.includes('visible-swelling')) return 'S1';
  if (groups.has('change')) return lastedOverADay === false ? 'S0' : 'S1';
  if (soreness === null) return null;
  return soreness.days <= 7 && soreness.onlyTrainedMuscles ? 'S0' : 'S1';
}

function groupOf(sign: ReportedSign): SignGroup {
  const found = reportedSigns.find(({ code }) => code === sign);
  if (!found) throw new RangeError(`‘${sign}’ is not a sign the report asks for.`);
  return found.group;
}

/** Three or more new symptoms, or swelling that can be seen: measure within 3 days rather than 7. */
function needsEarlyMeasurement({ signs }: SymptomReportAnswers): boolean {
  return signs.includes('visible-swelling') || signs.filter((sign) => groupOf(sign) === 'change').length >= 3;
}
