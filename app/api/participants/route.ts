import { listParticipantsInput } from '@/lib/participants/input';
import { listParticipants } from '@/lib/participants/list-participants';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'participant.list', summary: 'List participants', input: listParticipantsInput, run: listParticipants });
