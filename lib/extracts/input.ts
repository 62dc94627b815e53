import { z } from 'zod';

/** How far a data set is coarsened before it leaves. */
export const profiles = ['open', 'controlled'] as const;
export type Profile = (typeof profiles)[number];

const words = (most: number, sentence: string) => z.string().trim().min(1, sentence).max(most, `Use at most ${most} characters.`);

export const requestExtractInput = z.strictObject({
  profile: z.enum(profiles, { error: 'Choose open or controlled.' }),
  purpose: words(500, 'Write the question the data are for.'),
  recipient: words(200, 'Write who receives the files.'),
});
export type RequestExtractInput = z.output<typeof requestExtractInput>;

export const previewExtractInput = z.strictObject({ profile: z.enum(profiles).default('open') });
export const extractId = z.strictObject({ id: z.uuid() });
export const downloadFileInput = z.strictObject({ id: z.uuid(), name: z.string().regex(/^[a-z_]+\.(csv|txt)$/, 'There is no such file.') });
