import { z } from 'zod';
import { fetchConsentFile } from '@/lib/consent/fetch-consent-file';
import { route } from '@/lib/web/route';
import { serveFile } from '@/lib/web/serve-file';

export const GET = route({
  act: 'consent.file',
  summary: 'Save the signed paper form, or the participant’s copy',
  input: z.strictObject({ id: z.uuid(), which: z.enum(['copy', 'form']) }),
  run: fetchConsentFile,
  respond: serveFile,
});
