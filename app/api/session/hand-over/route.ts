import { z } from 'zod';
import { handOver } from '@/lib/auth/hand-over';
import { viewScreeningConsent } from '@/lib/consent/view-consent';
import { plainRoute } from '@/lib/web/plain-route';
import { requireStaffActor, sessionToken } from '@/lib/web/session';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';

const input = z.strictObject({ screeningId: z.uuid() });

export const POST = plainRoute('session.hand-over', async (body) => {
  const { screeningId } = input.parse(body);
  const actor = await requireStaffActor();
  const consent = await withWork(actor, 'consent.view', (work) => viewScreeningConsent(work, { screeningId }));
  const token = await sessionToken();
  if (!token || !consent) throw new Refusal('not-found', 'There is no consent to read here.');
  await handOver(token, { screeningId, siteId: consent.siteId });
  return { handedOver: true };
});
