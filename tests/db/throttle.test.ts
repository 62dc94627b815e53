import { expect, test } from 'vitest';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { handOver, takeBack } from '@/lib/auth/hand-over';
import { hashPassword } from '@/lib/auth/password';
import { openSession, verifySignIn } from '@/lib/auth/sign-in';
import { unknownSource } from '@/lib/auth/source';
import { asOwner, givenScene, givenScreening } from '../given';

const password = 'slack-water-lantern-9';
let people = 0;

/** A scene whose coordinator signs in with an address of its own. */
async function givenSignIn() {
  const scene = await givenScene();
  const email = `throttle-${(people += 1)}@tidemark.example`;
  await asOwner('insert into credential (account_id, email, password_hash) values ($1, $2, $3)', [scene.coordinator.accountId, email, await hashPassword(password)], 'sign-in');
  return { ...scene, email };
}

const count = (answers: readonly unknown[], wanted: unknown): number => answers.filter((answer) => answer === wanted).length;
const guess = (email: string, from: string, times: number): Promise<unknown[]> => Promise.all(Array.from({ length: times }, () => verifySignIn({ email, password: 'a guess', from })));
const codeOf = (error: { code: string }) => error.code;

test('forty guesses at one moment are ten, when one source tries one address', async () => {
  const { email } = await givenSignIn();
  const answers = await guess(email, '203.0.113.1', 40);
  expect([count(answers, null), count(answers, 'too-many')]).toEqual([10, 30]);
});

test('forty guesses at one moment on a tablet that was handed over are eight', async () => {
  const { coordinator, site, protocol } = await givenSignIn();
  const screening = await givenScreening(site, protocol);
  const token = await openSession(coordinator.accountId);
  await handOver(token, { screeningId: screening.id, siteId: site.id });
  const answers = await Promise.all(Array.from({ length: 40 }, () => takeBack(token, 'a guess').catch(codeOf)));
  expect([count(answers, 'invalid'), count(answers, 'too-many')]).toEqual([8, 32]);
});

test('one stranger does not shut the owner of an address out; many together meet the limit of the address', async () => {
  const { email, coordinator } = await givenSignIn();
  await guess(email, '203.0.113.2', 12);
  expect(await verifySignIn({ email, password, from: '203.0.113.3' })).toBe(coordinator.accountId);
  // Ten of the thirty are used; what a stranger tried is not forgotten because the owner came in.
  const answers = (await Promise.all(['203.0.113.4', '203.0.113.5', '203.0.113.6'].map((from) => guess(email, from, 10)))).flat();
  expect([count(answers, null), count(answers, 'too-many')]).toEqual([20, 10]);
});

test('one source that tries many addresses meets its own limit', async () => {
  const answers = await Promise.all(Array.from({ length: 70 }, (_, n) => verifySignIn({ email: `nobody-${n}@tidemark.example`, password: 'a guess', from: '203.0.113.9' })));
  expect([count(answers, null), count(answers, 'too-many')]).toEqual([60, 10]);
});

test('where nobody vouches for the source, a guesser meets the limit of the address and shuts nobody else out', async () => {
  const { email } = await givenSignIn();
  const other = await givenSignIn();
  const answers = await guess(email, unknownSource, 40);
  expect([count(answers, null), count(answers, 'too-many')]).toEqual([30, 10]);
  await Promise.all(Array.from({ length: 40 }, (_, n) => verifySignIn({ email: `stranger-${n}@tidemark.example`, password: 'a guess', from: unknownSource })));
  expect(await verifySignIn({ email: other.email, password, from: unknownSource })).toBe(other.coordinator.accountId);
});

test('right passwords are no tries: signing twenty times in a row goes on', async () => {
  const { coordinator, email } = await givenSignIn();
  for (let times = 0; times < 20; times += 1) await confirmPassword(coordinator, password);
  for (let times = 0; times < 12; times += 1) expect(await verifySignIn({ email, password, from: '203.0.113.10' })).toBe(coordinator.accountId);
});
