import { z } from 'zod';
import { viewConsent } from '@/lib/consent/view-consent';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'consent.view', summary: 'Read a consent with its form', input: z.strictObject({ id: z.uuid() }), run: viewConsent });
