import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';

interface Kept {
  content: Buffer;
  contentType: string;
}

export interface S3Fake {
  endpoint: string;
  kept: Map<string, Kept>;
  stop(): Promise<void>;
}

const missing = '<?xml version="1.0" encoding="UTF-8"?><Error><Code>NoSuchKey</Code><Message>The specified key does not exist.</Message></Error>';

/**
 * Speaks the part of the S3 protocol that the store uses: PUT, GET, HEAD and DELETE of an object with the bucket in the path.
 * It refuses what our store must never send: an unsigned request, or a body in checksummed chunks.
 */
export async function startS3Fake(): Promise<S3Fake> {
  const kept = new Map<string, Kept>();
  const server = createServer((request, response) => {
    const key = decodeURIComponent(new URL(request.url ?? '/', 'http://fake').pathname);
    const found = kept.get(key);
    const refuse = (status: number, body = '') => response.writeHead(status, { 'content-type': 'application/xml' }).end(body);
    if (!request.headers.authorization?.startsWith('AWS4-HMAC-SHA256 ')) return void refuse(403);
    if (request.headers['content-encoding']?.includes('aws-chunked')) return void refuse(400);
    switch (request.method) {
      case 'PUT':
        return void buffer(request).then((content) => {
          kept.set(key, { content, contentType: request.headers['content-type'] ?? '' });
          response.writeHead(200, { etag: '"kept"' }).end();
        });
      case 'DELETE':
        kept.delete(key);
        return void response.writeHead(204).end();
      case 'GET':
      case 'HEAD':
        if (!found) return void refuse(404, request.method === 'GET' ? missing : '');
        response.writeHead(200, { 'content-type': found.contentType, 'content-length': found.content.length });
        return void response.end(request.method === 'GET' ? found.content : undefined);
      default:
        return void refuse(405);
    }
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    endpoint: `http://127.0.0.1:${port}`,
    kept,
    stop: () =>
      new Promise((resolve) => {
        server.closeAllConnections();
        server.close(() => resolve());
      }),
  };
}
