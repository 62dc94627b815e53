import { z } from 'zod';

/** What Today may be narrowed to. */
export const todayKinds = ['all', 'visit', 'report', 'query', 'consent', 'questionnaire'] as const;
export type TodayKind = (typeof todayKinds)[number];

export const viewTodayInput = z.strictObject({ kind: z.enum(todayKinds).default('all') });
