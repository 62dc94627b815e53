import { extractId } from '@/lib/extracts/input';
import { retryExtract } from '@/lib/extracts/retry-extract';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'extract.request', summary: 'Prepare a failed extract once more', input: extractId, change: true, run: retryExtract });
