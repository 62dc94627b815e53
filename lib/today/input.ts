import { z } from 'zod';
import { workGroups } from './work-groups';
import { workKinds } from './kinds';

/** What Today may be narrowed to: everything, or one kind of work. */
export const todayKinds = ['all', ...workKinds.map(({ kind }) => kind)] as const;
export type TodayKind = (typeof todayKinds)[number];

/** Without a group every group shows its first rows; with one, this group alone, page by page. */
export const viewTodayInput = z
  .strictObject({
    kind: z.enum(todayKinds).default('all'),
    group: z.enum(workGroups).optional(),
    page: z.coerce.number().int().min(0).max(100_000).default(0),
  })
  .refine(({ group, page }) => group !== undefined || page === 0, { path: ['page'], message: 'Say which group the page is of.' });
export type ViewTodayInput = z.output<typeof viewTodayInput>;
