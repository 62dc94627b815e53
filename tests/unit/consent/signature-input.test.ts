import { expect, test } from 'vitest';
import { inkPxLeast, signatureMade } from '@/lib/consent/input';

const drawn = (path: string, field: { width?: number; height?: number } = {}) => signatureMade.safeParse({ kind: 'drawn', path, width: 300, height: 120, ...field });
const sentenceOf = (path: string): string => drawn(path).error?.issues.map(({ message }) => message).join(' ') ?? 'taken';

test('a drawn signature inside its field is taken', () => {
  expect(sentenceOf('M10.5 60L80 20L150.5 90.0M200 30L260 80')).toBe('taken');
});

test.each([
  ['a number of four hundred digits', `M1 1L${'9'.repeat(400)}1 40`],
  ['a number of five digits', 'M1 1L10000 40'],
  ['two points in a number', 'M1 1L4.0.0 90'],
  ['more decimals than a screen has', 'M1 1L100.123 90'],
  ['a negative number', 'M10 10L-200 90'],
  ['markup', 'M1 1L90 90"/><script>'],
  ['lines without a move', 'L1 1L90 90'],
])('%s could not be read', (_what, path) => {
  expect(sentenceOf(path)).toBe('The drawing could not be read. Clear it and sign again.');
});

test.each(['M1 1L301 40', 'M10 10L90 121', 'M900 10L10 10'])('%s leaves its field', (path) => {
  expect(sentenceOf(path)).toBe('The drawing leaves its field. Clear it and sign again.');
});

test.each([
  ['a dot', 'M50 50'],
  ['a dot that was held', `M50 50${'L50 50'.repeat(30)}`],
  // 39 pixels drawn; the 200 between the two strokes are not ink.
  ['two slips far apart', 'M10 10L29 10M229 10L249 10'],
])('%s is no signature', (_what, path) => {
  expect(sentenceOf(path)).toBe('That is too short to be a signature. Sign again, or type your name.');
});

test('the least ink is counted along the stroke, as Pythagoras measures it', () => {
  // 24 and 32 are the legs of a right triangle with 40 as its third side.
  expect(inkPxLeast).toBe(40);
  expect(sentenceOf('M10 10L34 42')).toBe('taken');
  expect(sentenceOf('M10 10L34 41.9')).not.toBe('taken');
});
