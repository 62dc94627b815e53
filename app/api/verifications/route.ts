import { markVerified } from '@/lib/review/mark-verified';
import { markVerifiedInput } from '@/lib/review/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'verification.mark', summary: 'Mark values as seen at source', input: markVerifiedInput, create: true, run: markVerified });
