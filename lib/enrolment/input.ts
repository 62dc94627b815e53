import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What screening and enrolment take from people: the same schema in the browser and on the server. */

/** Closed list for the participant flow; common practice, no source. */
export const notEnrolledReasons = [
  'Not eligible',
  'Declined: no interest',
  'Declined: no time',
  'Declined: distance or travel',
  'Declined: worried about lifting',
  'Advised against by the clinician',
  'Could not be reached',
  'Takes part in another study',
  'Other reason',
] as const;

const optionalText = (most: number) =>
  z
    .string()
    .trim()
    .max(most, `Use at most ${most} characters.`)
    .transform((text) => text || null)
    .nullable()
    .optional();

const date = (sentence: string) => calendarDay(sentence);
const optionalDate = (sentence: string) =>
  z
    .union([z.literal(''), date(sentence)])
    .transform((text) => text || null)
    .nullable()
    .optional();

const email = z
  .union([z.literal(''), z.string().trim().toLowerCase().pipe(z.email('Write the whole address, as in name@home.example.'))])
  .transform((text) => text || null)
  .nullable()
  .optional();

/** Name and contact: stand in their own table and never leave the site. */
const identityFields = {
  name: z.string().trim().min(2, 'Write the person’s name.').max(120, 'Use at most 120 characters.'),
  email,
  phone: z
    .union([z.literal(''), z.string().trim().regex(/^\+?[\d ()/-]{5,30}$/, 'Write the number in digits, as in +44 1632 960101.')])
    .transform((text) => text || null)
    .nullable()
    .optional(),
  bornOn: optionalDate('Give the date of birth as a day of the calendar.'),
};

export const openScreeningInput = z.strictObject({
  ...identityFields,
  /** Needed only by somebody who works at several sites. */
  siteId: z.uuid().optional(),
  cohort: z.string().min(1, 'Choose the cohort.').max(60),
  screenedOn: date('Give the day of screening.'),
  referredBy: optionalText(120),
});
export type OpenScreeningInput = z.output<typeof openScreeningInput>;

export const correctIdentityInput = z.strictObject({
  ...identityFields,
  id: z.uuid(),
  /** Needed once the person has signed; kept with the old values. */
  reason: z.string().trim().min(1, 'Say why it changes.').max(500, 'Use at most 500 characters.').optional(),
});
export type CorrectIdentityInput = z.output<typeof correctIdentityInput>;

export const answerCriterionInput = z.strictObject({
  id: z.uuid(),
  criterion: z.string().max(60),
  answer: z.enum(['yes', 'no'], { error: 'Answer yes or no.' }),
});

export const confirmEligibilityInput = z.strictObject({ id: z.uuid() });

export const leaveScreeningInput = z.strictObject({
  id: z.uuid(),
  notEnrolledReason: z.enum(notEnrolledReasons, { error: 'Choose the reason.' }),
  note: optionalText(500),
});

export const screeningStates = ['screening', 'not enrolled', 'enrolled'] as const;
export const screeningSorts = ['number', 'screenedOn', 'state'] as const;

export const listScreeningsInput = z.strictObject({
  page: z.coerce.number().int().min(0).max(100_000).default(0),
  pageSize: z.coerce.number().int().min(5).max(100).default(25),
  state: z.enum(screeningStates).optional(),
  siteId: z.uuid().optional(),
  sort: z.enum(screeningSorts).default('screenedOn'),
  direction: z.enum(['asc', 'desc']).default('desc'),
});
export type ListScreeningsInput = z.output<typeof listScreeningsInput>;

/** Choices of the facts at enrolment, as data and in words. */
export const surgeries = [
  { value: 'breast-conserving', label: 'Breast-conserving surgery' },
  { value: 'mastectomy', label: 'Mastectomy' },
  { value: 'mastectomy-reconstruction', label: 'Mastectomy with reconstruction' },
] as const;
export const axillaryProcedures = [
  { value: 'none', label: 'None' },
  { value: 'sentinel-node-biopsy', label: 'Sentinel node biopsy' },
  { value: 'axillary-dissection', label: 'Axillary dissection' },
] as const;
export const radiotherapies = [
  { value: 'none', label: 'None' },
  { value: 'breast-or-chest-wall', label: 'Breast or chest wall only' },
  { value: 'regional-nodes', label: 'Regional nodes as well' },
  { value: 'planned', label: 'Planned, not yet given' },
] as const;
export const systemicTherapies = [
  { value: 'none', label: 'None' },
  { value: 'endocrine', label: 'Endocrine therapy only' },
  { value: 'chemotherapy-taxane', label: 'Chemotherapy with a taxane' },
  { value: 'chemotherapy-other', label: 'Chemotherapy without a taxane' },
  { value: 'targeted', label: 'Targeted therapy without chemotherapy' },
] as const;

const oneOf = <V extends string>(choices: readonly { readonly value: V }[], sentence: string) =>
  z.enum(choices.map(({ value }) => value) as [V, ...V[]], { error: sentence });

/** '165' and '165,5' are heights in centimetres; 1.65 was meant as metres. */
const heightMm = z.union([z.string(), z.number()]).transform((typed, context) => {
  const text = String(typed).trim().replace(',', '.');
  const cm = Number(text);
  if (!/^\d+(\.\d+)?$/.test(text)) context.addIssue({ code: 'custom', message: `Give the height in centimetres, in digits, as 165.` });
  else if (cm >= 1.2 && cm <= 2.1) context.addIssue({ code: 'custom', message: `${text} looks like metres. Give the height in centimetres, as ${Math.round(cm * 100)}.` });
  else if (cm < 120 || cm > 210) context.addIssue({ code: 'custom', message: `${text} cm is outside 120 to 210. Check the height.` });
  return Math.round(cm * 10);
});

const nodeCount = z.union([z.string(), z.number()]).transform((typed, context) => {
  const text = String(typed).trim();
  if (!/^\d{1,2}$/.test(text) || Number(text) > 80) context.addIssue({ code: 'custom', message: 'Give the number of nodes removed, 0 to 80.' });
  return Number(text);
});

export const enrolInput = z.strictObject({
  id: z.uuid(),
  affectedSide: z.enum(['left', 'right'], { error: 'Choose the affected side.' }),
  dominantSide: z.enum(['left', 'right', 'both'], { error: 'Choose the dominant hand.' }),
  surgeryOn: date('Give the date of surgery.'),
  surgery: oneOf(surgeries, 'Choose the surgery.'),
  axillaryProcedure: oneOf(axillaryProcedures, 'Choose the axillary procedure.'),
  nodesRemoved: nodeCount,
  radiotherapy: oneOf(radiotherapies, 'Choose the radiotherapy.'),
  systemicTherapy: oneOf(systemicTherapies, 'Choose the systemic therapy.'),
  heightCm: heightMm,
});
/** As it is after parsing: `heightCm` was read into whole millimetres. */
export type EnrolInput = z.output<typeof enrolInput>;
