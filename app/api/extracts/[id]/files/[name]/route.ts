import { downloadFile } from '@/lib/extracts/download-file';
import { downloadFileInput } from '@/lib/extracts/input';
import { route } from '@/lib/web/route';
import { serveFile } from '@/lib/web/serve-file';

export const GET = route({ act: 'extract.download', summary: 'Save one file of an extract', input: downloadFileInput, run: downloadFile, respond: serveFile });
