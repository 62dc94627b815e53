import { extractId } from '@/lib/extracts/input';
import { viewExtract } from '@/lib/extracts/view-extract';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'extract.view', summary: 'Read an extract with its files and checksums', input: extractId, run: viewExtract });
