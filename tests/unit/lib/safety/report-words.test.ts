import { expect, test } from 'vitest';
import { reportWords } from '@/lib/safety/report-words';

test('a line of what was said begins with a capital, and units keep theirs', () => {
  expect(reportWords({ signs: ['hot', 'fever'], lastedOverADay: null, soreness: null })).toMatch(/^[A-Z][^A-Z]*, fever of 38 °C or more$/);
});
