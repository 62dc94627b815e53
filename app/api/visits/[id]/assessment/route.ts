import { z } from 'zod';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { beginAssessmentInput } from '@/lib/measurement/input';
import { viewAssessment } from '@/lib/measurement/view-assessment';
import { route } from '@/lib/web/route';

export const GET = route({
  act: 'assessment.view',
  summary: 'Show the limb assessment of a visit',
  input: z.strictObject({ id: z.uuid() }),
  run: (work, { id }) => viewAssessment(work, { visitId: id }),
});
export const POST = route({ act: 'assessment.begin', summary: 'Begin the limb assessment of a visit', input: beginAssessmentInput, create: true, run: beginAssessment });
