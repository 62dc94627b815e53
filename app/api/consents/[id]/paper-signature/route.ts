import { paperSignatureInput } from '@/lib/consent/input';
import { recordPaperSignature } from '@/lib/consent/record-paper-signature';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.upload', summary: 'Record what stands on the signed paper form', input: paperSignatureInput, change: true, run: recordPaperSignature });
