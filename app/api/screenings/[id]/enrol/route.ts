import { enrolParticipant } from '@/lib/enrolment/enrol-participant';
import { enrolInput } from '@/lib/enrolment/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'participant.enrol', summary: 'Enrol a participant', input: enrolInput, create: true, run: enrolParticipant });
