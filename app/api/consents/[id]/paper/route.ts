import { z } from 'zod';
import { formBytesMost } from '@/lib/consent/input';
import { receivePaperForm } from '@/lib/consent/receive-paper-form';
import { formTypes } from '@/lib/consent/recognise-form';
import { uploadRoute } from '@/lib/web/upload-route';

export const POST = uploadRoute({
  act: 'consent.upload',
  summary: 'Send the signed paper form (PDF, JPEG or PNG) as the whole body',
  input: z.strictObject({ id: z.uuid() }),
  types: formTypes,
  bytesMost: formBytesMost,
  receive: receivePaperForm,
});
