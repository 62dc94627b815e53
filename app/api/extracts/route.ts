import { z } from 'zod';
import { requestExtractInput } from '@/lib/extracts/input';
import { listExtracts } from '@/lib/extracts/list-extracts';
import { requestExtract } from '@/lib/extracts/request-extract';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'extract.list', summary: 'List the data sets that were asked for', input: z.strictObject({}), run: listExtracts });
export const POST = route({ act: 'extract.request', summary: 'Ask for a de-identified data set', input: requestExtractInput, create: true, run: requestExtract });
