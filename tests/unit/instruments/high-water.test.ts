import { expect, test } from 'vitest';
import { highWater } from '@/instruments/swelling';

test('high water is the primary definition’s own line, else that of RVC 10 %', () => {
  expect(highWater('D5').percent).toBe(5);
  expect(highWater('D6').percent).toBe(10);
  expect(highWater('D1')).toEqual(highWater('D6'));
});
