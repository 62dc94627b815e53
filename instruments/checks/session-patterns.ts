import { KG_PER_LB } from '../units';
import { defineEditCheck } from './define-edit-check';

/** The same exercise's load last time and now, in kilograms as typed. */
export interface LoadsThenAndNow {
  readonly loads: readonly { readonly beforeKg: number; readonly nowKg: number }[];
}

const CLOSE = 0.06;

export const sessionInPounds = defineEditCheck<LoadsThenAndNow>({
  id: 'session.pounds',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Loads look like pounds typed as kilograms',
  source: '1 kg = 2.2046 lb; the pattern is common practice, no source',
  run({ loads }) {
    const looksLikePounds = loads.length >= 2 && loads.every(({ beforeKg, nowKg }) => beforeKg > 0 && Math.abs(nowKg * KG_PER_LB - beforeKg) <= CLOSE * beforeKg);
    if (!looksLikePounds) return null;
    const first = loads[0]?.nowKg ?? 0;
    return { message: `Each load is about 2.2 times last session’s. ${first} lb is ${(first * KG_PER_LB).toFixed(1)} kg. If you read pounds, change the unit.`, value: first };
  },
  examplePass: { loads: [{ beforeKg: 4, nowKg: 5 }, { beforeKg: 6, nowKg: 6 }] },
  exampleFires: { loads: [{ beforeKg: 4, nowKg: 9 }, { beforeKg: 6, nowKg: 13 }] },
});

const SAME_IN_A_ROW = 6;

export const sessionsIdentical = defineEditCheck<{ readonly fingerprints: readonly string[] }>({
  id: 'session.identical',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Six sessions in a row with the same sets and effort',
  source: 'common practice, no source',
  run({ fingerprints }) {
    const last = fingerprints.slice(-SAME_IN_A_ROW);
    const isSame = last.length === SAME_IN_A_ROW && last.every((fingerprint) => fingerprint === last[0]);
    return isSame ? { message: `${SAME_IN_A_ROW} sessions in a row are the same in every set. Ask whether each was logged on its day.` } : null;
  },
  examplePass: { fingerprints: ['a', 'a', 'a', 'a', 'a', 'b'] },
  exampleFires: { fingerprints: ['a', 'a', 'a', 'a', 'a', 'a'] },
});

export const sessionDuplicate = defineEditCheck<{ readonly fingerprint: string; readonly sameDayFingerprints: readonly string[] }>({
  id: 'session.duplicate',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'The same session twice on one day',
  source: 'common practice, no source',
  run: ({ fingerprint, sameDayFingerprints }) =>
    sameDayFingerprints.includes(fingerprint) ? { message: 'A session with the same sets is already logged for this day. Leave this one out, or keep it if you trained twice.' } : null,
  examplePass: { fingerprint: 'a', sameDayFingerprints: ['b'] },
  exampleFires: { fingerprint: 'a', sameDayFingerprints: ['a'] },
});
