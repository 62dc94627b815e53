import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What consent takes from people: the same schema in the browser and on the server. */
export const consentModes = ['tablet', 'home', 'paper'] as const;
export type ConsentMode = (typeof consentModes)[number];

export const startConsentInput = z.strictObject({ id: z.uuid(), mode: z.enum(consentModes, { error: 'Choose how the person will read and sign.' }) });

export const readPartInput = z.strictObject({ id: z.uuid(), part: z.string().max(60) });

/** A signature as it was made. A drawing is an SVG path of moves and lines, in the pixels of its field. */
export const signatureMade = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({ kind: z.literal('typed'), name: z.string().trim().min(2, 'Type your full name as your signature.').max(120, 'Use at most 120 characters.') }),
    z.strictObject({
      kind: z.literal('drawn'),
      path: z
        .string()
        .max(50_000, 'The drawing is too long to keep. Clear it and sign again, or type your name.')
        .regex(/^(M[\d.]+ [\d.]+(L-?[\d.]+ -?[\d.]+)*)+$/, 'The drawing could not be read. Clear it and sign again.'),
      width: z.int().min(50).max(4000),
      height: z.int().min(30).max(4000),
    }),
  ],
  { error: 'Sign with a finger, or type your name.' },
);

const answers = z.record(z.string().max(60), z.enum(['yes', 'no'], { error: 'Answer yes or no.' }));

export const signConsentInput = z.strictObject({
  id: z.uuid(),
  /** Keys of the statements that were ticked: all of the form's. */
  statements: z.array(z.string().max(60)).max(40),
  /** Every optional permission, each answered. */
  permissions: answers,
  signature: signatureMade,
});
export type SignConsentInput = z.infer<typeof signConsentInput>;

export const paperSignatureInput = z.strictObject({
  id: z.uuid(),
  signedOn: calendarDay('Give the day that stands beside the signature.'),
  statements: z.array(z.string().max(60)).max(40),
  permissions: answers,
});

/** What the person who took consent states by signing second. */
export const staffStatement =
  'I explained the study, answered the questions that were asked, and saw that the person understood and agreed freely.';

export const countersignInput = z.strictObject({
  id: z.uuid(),
  agreed: z.literal(true, { error: 'Tick the statement before you sign.' }),
  name: z.string().trim().min(2, 'Type your full name as your signature.').max(120, 'Use at most 120 characters.'),
  /** Signing takes the password once more: the tablet may still be in the participant's hands. */
  password: z.string().min(1, 'Write your password to sign.').max(256),
});

/** Largest signed form that is taken. */
export const formBytesMost = 10_000_000;
