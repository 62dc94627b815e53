import { viewTodayInput } from '@/lib/today/input';
import { viewToday } from '@/lib/today/view-today';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'today.view', summary: 'Show the work of the day at the own sites', input: viewTodayInput, run: viewToday });
