import { z } from 'zod';
import { viewScreening } from '@/lib/enrolment/view-screening';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'screening.view', summary: 'Read a screening with its checklist', input: z.strictObject({ id: z.uuid() }), run: viewScreening });
