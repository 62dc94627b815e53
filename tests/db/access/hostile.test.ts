import { beforeAll, describe, expect, test, vi } from 'vitest';
import { routes } from '@/app/api/routes';
import { may } from '@/lib/auth/policy';
import { grantedRoles, type Actor, type Role } from '@/lib/auth/roles';
import { givenScene, givenStaff } from '../../given';
import { requestOf } from './request-of';
import { samples, type Sample } from './samples';
import { subjectAt, type Subject } from './subjects';

/**
 * Every address × every field × what nobody should send: the answer is a refusal a person can read, or the value is kept;
 * it is never a fault. Whoever may do the act asks, so that the value reaches the data base.
 */
const asking = vi.hoisted(() => ({ actor: null as Actor | null }));
vi.mock('@/lib/web/session', () => ({
  currentSession: () => Promise.resolve(asking.actor === null ? null : { actor: asking.actor, grants: [], grantId: '', studyName: '', siteNames: [] }),
  sessionToken: () => Promise.resolve(null),
}));
vi.mock('@/lib/auth/confirm-password', () => ({ confirmPassword: () => Promise.resolve() }));

const texts = ['\u0000', 'a\u0000b', '\ud800', '0000-01-01', '9999-12-31', '2027-02-30', 'constructor', '__proto__', '%', '1e308', 'NaN', '-0', '37,5', '', 'x'.repeat(70_000), "'; drop table visit; --"];
const numbers = [1e308, -1e308, 2 ** 53, 2 ** 31, -1, -0, 0.1 + 0.2, 1e-320];
const others: readonly unknown[] = [null, true, [], {}, [['\u0000']], { toString: 'x' }];
const hostile: readonly unknown[] = [...texts, ...numbers, ...others];

const addresses = Object.entries(routes)
  .flatMap(([address, methods]) => Object.entries(methods).map(([method, handler]) => ({ name: `${method} ${address}`, address, method, handler })))
  .filter(({ handler }) => !handler.declaration.open);

let subject: Subject;
/** Every role that is granted, and whoever holds a tablet that was handed over. */
const walkers: readonly Role[] = [...grantedRoles, 'invitee'];
const actors = new Map<Role, Actor>();

beforeAll(async () => {
  const scene = await givenScene();
  subject = await subjectAt(scene, scene.site, scene.coordinator);
  for (const role of grantedRoles) actors.set(role, role === 'participant' ? subject.participant.actor : await givenStaff(role, scene.site));
  actors.set('invitee', subject.atTablet);
});

/** The sample with one field at a time replaced by each hostile value; parameters and query take texts only. */
function spoiled({ params = {}, query = {}, ...rest }: Sample): { what: string; sample: Sample }[] {
  const body = (rest.body ?? {}) as Readonly<Record<string, unknown>>;
  const inTexts = (part: 'params' | 'query', fields: Readonly<Record<string, string>>) =>
    Object.keys(fields).flatMap((name) => texts.filter((text) => text.length < 2000 && text !== '' && !/\p{Surrogate}/u.test(text)).map((text) => ({ what: `${part}.${name} = ${JSON.stringify(text)}`, sample: { params, query, body, [part]: { ...fields, [name]: text } } })));
  const inBody = Object.keys(body).flatMap((name) => hostile.map((value) => ({ what: `${name} = ${String(JSON.stringify(value)).slice(0, 40)}`, sample: { params, query, body: { ...body, [name]: value } } })));
  return [...inTexts('params', params), ...inTexts('query', query), ...inBody];
}

describe.each(addresses.map((route) => [route.name, route] as const))('%s', (name, { address, method, handler }) => {
  test('meets no value it cannot answer', async () => {
    const role = walkers.find((candidate) => may(candidate, handler.declaration.act));
    const make = samples[name];
    if (!role || !make) throw new Error(`Nobody may ask ${name}, or it has no sample.`);
    asking.actor = actors.get(role) ?? null;
    const faults: string[] = [];
    for (const { what, sample } of spoiled(make(subject))) {
      const { status } = await handler(...requestOf({ address, method }, sample));
      if (status >= 500) faults.push(what);
    }
    expect(faults.join('\n')).toBe('');
  }, 120_000);
});
