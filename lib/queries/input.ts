import { z } from 'zod';

/** What the margin sends: the same schema in the browser and on the server. */
const words = (sentence: string) => z.string().trim().min(1, sentence).max(1000, 'Use at most 1 000 characters.');

export const fieldTargetInput = z.strictObject({
  table: z.enum(['visit', 'limb_assessment', 'limb_trial', 'questionnaire_response', 'participant']),
  id: z.uuid(),
  field: z.string().regex(/^[a-z_]+(\.[\w-]{1,60})?$/),
});

/** A query asks; it never names the value it expects (it would lead the answer). */
const leading = [
  /\b(chang|correct|alter|set|amend|adjust)\w*\b[^.?!\d]{0,20}\b(to|as|into)\b[^.?!\d]{0,12}\d/i,
  /\b(should|ought to|must|has to|needs? to|supposed to|expected to|meant to)\b[^.?!\d]{0,30}\b(be|been|read|say|show|give|have)\b[^.?!\d]{0,20}\d/i,
  /\bd(o|id) you mean\b[^.?!\d]{0,20}\d/i,
  /\bplease\s+(enter|type|put|write|record|make it)\b[^.?!\d]{0,20}\d/i,
];
const leads = (text: string): boolean => leading.some((pattern) => pattern.test(text));
const question = (sentence: string) => words(sentence).refine((text) => !leads(text), 'Ask what was seen; do not name the value you expect.');

export const raiseQueryInput = z.strictObject({
  target: fieldTargetInput,
  question: question('Write the question.'),
});
export type RaiseQueryInput = z.output<typeof raiseQueryInput>;

export const answerQueryInput = z.strictObject({ id: z.uuid(), answer: words('Write the answer.') });
export const closeQueryInput = z.strictObject({ id: z.uuid(), note: z.string().trim().max(1000).optional() });
export const cancelQueryInput = z.strictObject({ id: z.uuid(), reason: words('Say why the query is withdrawn.') });
export const askAgainInput = z.strictObject({ id: z.uuid(), question: question('Write what is still open.') });
export const remindInput = z.strictObject({ id: z.uuid() });

export const closeQueriesInput = z.strictObject({
  ids: z.array(z.uuid()).min(1, 'Choose at least one query.').max(100, 'Close at most 100 at once.'),
  reason: words('Say why they are closed.'),
});

export const queryStates = ['open', 'answered', 'closed', 'cancelled'] as const;
export const querySorts = ['number', 'raisedAt', 'state', 'participant'] as const;

export const listQueriesInput = z.strictObject({
  page: z.coerce.number().int().min(0).max(100_000).default(0),
  pageSize: z.coerce.number().int().min(5).max(100).default(25),
  states: z
    .string()
    .default('open,answered')
    .transform((text) => text.split(',').filter(Boolean))
    .pipe(z.array(z.enum(queryStates))),
  siteId: z.uuid().optional(),
  olderThanDays: z.coerce.number().int().min(0).max(5000).default(0),
  sort: z.enum(querySorts).default('raisedAt'),
  direction: z.enum(['asc', 'desc']).default('asc'),
});
export type ListQueriesInput = z.output<typeof listQueriesInput>;
