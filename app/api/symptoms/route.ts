import { listReportsInput, reportSymptomsInput } from '@/lib/safety/input';
import { listOpenReports } from '@/lib/safety/list-open-reports';
import { reportSymptoms } from '@/lib/safety/report-symptoms';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'symptom.list', summary: 'List the symptom reports that wait for a review', input: listReportsInput, run: listOpenReports });
export const POST = route({ act: 'symptom.report', summary: 'Report a change in the arm', input: reportSymptomsInput, create: true, run: reportSymptoms });
