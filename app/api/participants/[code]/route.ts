import { z } from 'zod';
import { viewParticipant } from '@/lib/participants/view-participant';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'participant.view', summary: 'Show one participant by code', input: z.strictObject({ code: z.string().max(12) }), run: viewParticipant });
