import 'server-only';
import { Readable } from 'node:stream';
import { storage } from '@/lib/storage';
import { nothingRuns } from './file-policy';

/** A kept file as it is handed out. */
export interface ServedFile {
  readonly storageKey: string;
  readonly contentType: string;
  readonly byteCount: number;
  readonly filename: string;
}

/** Streams a kept file to be saved, never shown in the page: what somebody uploaded must not run here. */
export async function serveFile({ storageKey, contentType, byteCount, filename }: ServedFile): Promise<Response> {
  const content = await storage().get(storageKey);
  return new Response(Readable.toWeb(content) as ReadableStream, {
    headers: {
      'content-type': contentType,
      'content-length': String(byteCount),
      'content-disposition': `attachment; filename="${filename.replace(/[^A-Za-z0-9._-]/g, '_')}"`,
      'x-content-type-options': 'nosniff',
      'content-security-policy': nothingRuns,
      'cache-control': 'no-store',
    },
  });
}
