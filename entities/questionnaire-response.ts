import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';

/** A questionnaire in its window. Partial answers are kept; submit closes. */
export const QuestionnaireResponseSchema = defineEntity({
  name: 'QuestionnaireResponse',
  tableName: 'questionnaire_response',
  properties: {
    ...recordBase(),
    visitId: p.uuid().nullable(),
    instrument: p.string(),
    instrumentVersion: p.integer(),
    language: p.string(),
    dueOn: p.date(),
    opensOn: p.date(),
    closesOn: p.date(),
    state: p.enum(['due', 'in progress', 'submitted', 'missed']),
    answers: p.json<Record<string, unknown>>(),
    leftOut: p.array<string>(),
    page: p.integer(),
    mode: p.string(),
    startedAt: p.datetime().nullable(),
    submittedAt: p.datetime().nullable(),
    scores: p.json<Record<string, number | null>>(),
  },
});
export type QuestionnaireResponse = InferEntity<typeof QuestionnaireResponseSchema>;
