import { afterEach, expect, test, vi } from 'vitest';
import { sourceOf } from '@/lib/auth/source';

afterEach(() => vi.unstubAllEnvs());

test.each([
  // Without proxies of our own the header is the sender's word.
  [undefined, '9.9.9.1', 'direct'],
  ['0', '9.9.9.1, 203.0.113.7', 'direct'],
  // One proxy adds the address it saw; whatever the sender wrote stands before it.
  ['1', '9.9.9.1, 203.0.113.7', '203.0.113.7'],
  ['1', '203.0.113.7', '203.0.113.7'],
  ['2', '9.9.9.1, 203.0.113.7, 10.0.0.2', '203.0.113.7'],
  // Fewer hops than proxies: it did not come through them.
  ['2', '10.0.0.2', 'direct'],
  ['1', '', 'direct'],
  ['1', null, 'direct'],
  ['1', 'x'.repeat(65), 'direct'],
])('with %s proxies, %s comes from %s', (proxies, header, source) => {
  vi.stubEnv('TRUSTED_PROXIES', proxies);
  expect(sourceOf(header)).toBe(source);
});

test('a number of proxies that is none is refused', () => {
  vi.stubEnv('TRUSTED_PROXIES', 'many');
  expect(() => sourceOf('203.0.113.7')).toThrow('TRUSTED_PROXIES is not usable');
});
