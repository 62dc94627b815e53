import { addVisit } from '@/lib/schedule/add-unscheduled-visit';
import { addVisitInput } from '@/lib/schedule/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.add', summary: 'Add an unscheduled visit', input: addVisitInput, create: true, run: addVisit });
