import { z } from 'zod';
import { viewWeek } from '@/lib/training/view-week';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'week.view', summary: 'Show this week of the participant who is signed in', input: z.strictObject({}), run: viewWeek });
