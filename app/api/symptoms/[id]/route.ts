import { reportIdInput } from '@/lib/safety/input';
import { viewReport } from '@/lib/safety/view-report';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'symptom.view', summary: 'Show a symptom report', input: reportIdInput, run: viewReport });
