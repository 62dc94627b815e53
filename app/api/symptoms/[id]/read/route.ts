import { reportIdInput } from '@/lib/safety/input';
import { markReportRead } from '@/lib/safety/mark-report-read';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'symptom.read', summary: 'Mark a symptom report as read', input: reportIdInput, run: markReportRead });
