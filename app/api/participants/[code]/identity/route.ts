import { z } from 'zod';
import { revealIdentity } from '@/lib/participants/reveal-identity';
import { route } from '@/lib/web/route';

/** A POST, because the reading writes to the audit trail. */
export const POST = route({ act: 'identity.view', summary: 'Read name and contact by participant code', input: z.strictObject({ code: z.string().max(12) }), run: revealIdentity });
