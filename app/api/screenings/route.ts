import { openScreeningInput, listScreeningsInput } from '@/lib/enrolment/input';
import { listScreenings } from '@/lib/enrolment/list-screenings';
import { openScreening } from '@/lib/enrolment/open-screening';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'screening.list', summary: 'Read one page of the screening log', input: listScreeningsInput, run: listScreenings });
export const POST = route({ act: 'screening.open', summary: 'Open a screening', input: openScreeningInput, create: true, run: openScreening });
