import fc from 'fast-check';
import { expect, test } from 'vitest';
import { checkCharacter, isParticipantCode, participantCode } from '@/instruments/participant-code';

/*
 * ISO/IEC 7064 MOD 37,36 against identifiers that are published with it:
 * A1-2425G-ABC1234002-M, the worked example of the GRid standard (the other two GRids as printed in the documentation
 * of the grid-number library), and an audiovisual number of ISO 15706 (ISAN) with both of its check characters.
 */
test.each([
  ['A12425GABC1234002', 'M'],
  ['A12425GABC1234011', 'K'],
  ['A12425GX999150000', '3'],
  ['00000000C36D002B', 'K'],
  ['00000000C36D002B00000000', 'E'],
])('the check character of %s is %s', (text, check) => {
  expect(checkCharacter(text)).toBe(check);
});

test('a code is the site prefix, the running number and the check character', () => {
  expect(participantCode('NM', 42)).toMatch(/^NM-0042[0-9A-Z]$/);
  expect(participantCode('NM', 12345)).toMatch(/^NM-12345[0-9A-Z]$/);
  expect(isParticipantCode(participantCode('SM', 7))).toBe(true);
});

test('a wrong character is always noticed', () => {
  const code = fc.tuple(fc.constantFrom('NM', 'SM', 'KB'), fc.integer({ min: 1, max: 999_999 }));
  fc.assert(
    fc.property(code, fc.nat(), fc.constantFrom(...'0123456789'), ([prefix, number], place, digit) => {
      const right = participantCode(prefix, number);
      const at = 3 + (place % (right.length - 4));
      const wrong = right.slice(0, at) + digit + right.slice(at + 1);
      expect(isParticipantCode(wrong)).toBe(wrong === right);
    }),
  );
});

test('what is no code is refused', () => {
  expect(() => participantCode('nm', 1)).toThrow(RangeError);
  expect(() => participantCode('NM', 0)).toThrow(RangeError);
  expect(() => checkCharacter('A-1')).toThrow(RangeError);
  expect(isParticipantCode('NM-0042')).toBe(false);
});
