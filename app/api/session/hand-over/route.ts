import { z } from 'zod';
import { handOverForConsent } from '@/lib/consent/hand-over-for-consent';
import { plainRoute } from '@/lib/web/plain-route';
import { requireSignedIn, requireToken } from '@/lib/web/session';

export const POST = plainRoute({
  act: 'session.hand-over',
  summary: 'Hand the tablet to a participant for one consent',
  input: z.strictObject({ screeningId: z.uuid() }),
  receive: async ({ screeningId }) => handOverForConsent(await requireSignedIn(), await requireToken(), screeningId),
});
