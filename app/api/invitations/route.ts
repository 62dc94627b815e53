import { z } from 'zod';
import { inviteParticipant } from '@/lib/enrolment/invite-participant';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'participant.invite', summary: 'Mail a participant’s invitation again', input: z.strictObject({ participantId: z.uuid() }), create: true, run: inviteParticipant });
