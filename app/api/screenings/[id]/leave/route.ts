import { leaveScreeningInput } from '@/lib/enrolment/input';
import { leaveScreening } from '@/lib/enrolment/leave-screening';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'screening.leave', summary: 'End a screening without enrolment', input: leaveScreeningInput, change: true, run: leaveScreening });
