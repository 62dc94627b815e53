import { completeVisit } from '@/lib/schedule/complete-visit';
import { completeVisitInput } from '@/lib/schedule/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.complete', summary: 'End a visit at which no arms were measured', input: completeVisitInput, change: true, run: completeVisit });
