import { z } from 'zod';

/** What questionnaires take: answers by item, checked against the questionnaire itself once it is known. */
const answers = z.record(z.string().max(60), z.union([z.number(), z.string().max(4000)]));

export const questionnaireIdInput = z.strictObject({ id: z.uuid() });
export const listQuestionnairesInput = z.strictObject({});
export const saveAnswersInput = z.strictObject({ id: z.uuid(), answers, /** Index of the page reached. */ page: z.int().min(0).max(200) });
export const submitAnswersInput = z.strictObject({ id: z.uuid(), answers });
