import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What consent takes from people: the same schema in the browser and on the server. */
export const consentModes = ['tablet', 'home', 'paper'] as const;
export type ConsentMode = (typeof consentModes)[number];

export const startConsentInput = z.strictObject({ id: z.uuid(), mode: z.enum(consentModes, { error: 'Choose how the person will read and sign.' }) });

export const readPartInput = z.strictObject({ id: z.uuid(), part: z.string().max(60) });

/** Moves and lines, each point two numbers of at most four digits and one decimal. The data base holds the same form. */
const coordinate = String.raw`\d{1,4}(?:\.\d)?`;
const drawnPath = new RegExp(`^(?:M${coordinate} ${coordinate}(?:L${coordinate} ${coordinate})*)+$`);

/** Ink of a drawing in pixels below which it is a dot or a slip, not a signature; common practice, no source. */
export const inkPxLeast = 40;

interface Point {
  readonly x: number;
  readonly y: number;
}

/** The strokes of a path that has the right form. */
const strokesOf = (path: string): Point[][] =>
  path
    .split('M')
    .slice(1)
    .map((stroke) => stroke.split('L').map((point) => ({ x: Number(point.split(' ')[0]), y: Number(point.split(' ')[1]) })));

/** The way the pen went on the field; what it went between strokes does not count. */
const inkOf = (strokes: readonly (readonly Point[])[]): number =>
  strokes.reduce((sum, points) => sum + points.reduce((way, { x, y }, at) => way + (at === 0 ? 0 : Math.hypot(x - (points[at - 1]?.x ?? x), y - (points[at - 1]?.y ?? y))), 0), 0);

const drawn = z
  .strictObject({
    kind: z.literal('drawn'),
    path: z
      .string()
      .max(50_000, 'The drawing is too long to keep. Clear it and sign again, or type your name.')
      .regex(drawnPath, 'The drawing could not be read. Clear it and sign again.'),
    width: z.int().min(50).max(4000),
    height: z.int().min(30).max(4000),
  })
  .superRefine(({ path, width, height }, context) => {
    if (!drawnPath.test(path)) return;
    const strokes = strokesOf(path);
    if (strokes.flat().some(({ x, y }) => x > width || y > height)) context.addIssue({ code: 'custom', path: ['path'], message: 'The drawing leaves its field. Clear it and sign again.' });
    else if (inkOf(strokes) < inkPxLeast) context.addIssue({ code: 'custom', path: ['path'], message: 'That is too short to be a signature. Sign again, or type your name.' });
  });

/** A signature as it was made. A drawing is an SVG path of moves and lines, in the pixels of its field. */
export const signatureMade = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({ kind: z.literal('typed'), name: z.string().trim().min(2, 'Type your full name as your signature.').max(120, 'Use at most 120 characters.') }),
    drawn,
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
