import { beginVisit } from '@/lib/schedule/begin-visit';
import { beginVisitInput } from '@/lib/schedule/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.begin', summary: 'Begin a visit today', input: beginVisitInput, change: true, run: beginVisit });
