import { previewExtractInput } from '@/lib/extracts/input';
import { previewExtract } from '@/lib/extracts/preview-extract';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'extract.preview', summary: 'Read what a profile keeps, changes and leaves out', input: previewExtractInput, run: previewExtract });
