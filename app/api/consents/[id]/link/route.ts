import { z } from 'zod';
import { sendConsentLink } from '@/lib/consent/start-consent';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.send-link', summary: 'Mail a new link for reading at home', input: z.strictObject({ id: z.uuid() }), create: true, run: sendConsentLink });
