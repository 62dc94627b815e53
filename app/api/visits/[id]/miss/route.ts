import { missVisitInput } from '@/lib/schedule/input';
import { missVisit } from '@/lib/schedule/miss-visit';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.miss', summary: 'Record that a visit did not take place', input: missVisitInput, change: true, run: missVisit });
