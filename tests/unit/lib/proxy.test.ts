import { NextRequest } from 'next/server';
import { expect, test } from 'vitest';
import { nothingRuns } from '@/lib/web/file-policy';
import { proxy } from '@/proxy';

const policyOf = (path: string) => proxy(new NextRequest(`http://127.0.0.1:3000${path}`)).headers.get('content-security-policy') ?? '';

test.each([
  '/api/consents/00000000-0000-4000-8000-00000000000a/file/form',
  '/api/extracts/00000000-0000-4000-8000-00000000000a/files/participants.csv',
  '/api/audit/file',
  '/api/participants',
])('what comes from %s runs nothing, should a browser open it as a page', (path) => {
  expect(policyOf(path)).toBe(nothingRuns);
  expect(nothingRuns).toBe("default-src 'none'; frame-ancestors 'none'; sandbox");
});

test.each(['/today', '/api-docs', '/apiary'])('%s is a page, with a nonce of its own', (path) => {
  expect(policyOf(path)).toMatch(/script-src 'self' 'nonce-[A-Za-z0-9+/=]+' 'strict-dynamic'/);
  expect(policyOf(path)).not.toBe(policyOf(path));
});
