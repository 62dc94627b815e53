import { completeAssessment } from '@/lib/measurement/complete-assessment';
import { completeAssessmentInput } from '@/lib/measurement/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'assessment.complete', summary: 'Save a limb assessment as complete', input: completeAssessmentInput, change: true, run: completeAssessment });
