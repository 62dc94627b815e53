import { beforeAll, describe, expect, test, vi } from 'vitest';
import { routes } from '@/app/api/routes';
import { may } from '@/lib/auth/policy';
import { grantedRoles, type Actor, type Role } from '@/lib/auth/roles';
import type { RouteHandler } from '@/lib/web/route';
import { givenScene, givenStaff, type GivenScene } from '../../given';
import { requestOf } from './request-of';
import { samples, type Sample } from './samples';
import { subjectAt, type Subject } from './subjects';

/**
 * Every role × every address × own site, other site, own record, other record, nobody. Who asks is the only thing that
 * differs: the session is replaced, everything below it (policy, transaction, row-level security) is real.
 */
const asking = vi.hoisted(() => ({ actor: null as Actor | null }));
vi.mock('@/lib/web/session', () => ({
  currentSession: () => Promise.resolve(asking.actor === null ? null : { actor: asking.actor, grants: [], grantId: '', studyName: '', siteNames: [] }),
  sessionToken: () => Promise.resolve(null),
}));

// Signing twice is tested by itself (tests/db/confirm-password.test.ts); here only reach decides.
vi.mock('@/lib/auth/confirm-password', () => ({ confirmPassword: () => Promise.resolve() }));

const addresses = Object.entries(routes).flatMap(([address, methods]) => Object.entries(methods).map(([method, handler]) => ({ name: `${method} ${address}`, address, method, handler })));
const guarded = addresses.filter(({ handler }) => !handler.declaration.open);

let scene: GivenScene;
let own: Subject;
let other: Subject;
/** Another participant of the same site: for 'own record, other record'. */
let neighbour: Subject;
/** Every role that is granted, and whoever holds a tablet that was handed over. */
const walkers = [...grantedRoles, 'invitee'] as const satisfies readonly Role[];
const actors = new Map<Role, Actor>();

beforeAll(async () => {
  scene = await givenScene();
  own = await subjectAt(scene, scene.site, scene.coordinator);
  neighbour = await subjectAt(scene, scene.site, scene.coordinator);
  other = await subjectAt(scene, scene.otherSite, scene.otherCoordinator);
  actors.set('invitee', own.atTablet);
  for (const role of grantedRoles) actors.set(role, role === 'participant' ? own.participant.actor : await givenStaff(role, scene.site));
});

async function ask(actor: Actor | null, { address, method, handler }: { address: string; method: string; handler: RouteHandler }, sample: Sample): Promise<{ status: number; text: string }> {
  asking.actor = actor;
  const response = await handler(...requestOf({ address, method }, sample));
  return { status: response.status, text: await response.text() };
}

const sampleOf = (name: string, subject: Subject): Sample => {
  const make = samples[name];
  if (!make) throw new Error(`${name} has no sample in tests/db/access/samples.ts.`);
  return make(subject);
};

test('every guarded address has a sample, and no sample is left over', () => {
  expect(Object.keys(samples).sort()).toEqual(guarded.map(({ name }) => name).sort());
});

describe.each(guarded.map((route) => [route.name, route] as const))('%s', (name, route) => {
  const { act } = route.handler.declaration;

  test('asks nobody in', async () => {
    expect((await ask(null, route, sampleOf(name, own))).status).toBe(401);
  });

  test('refuses every role without the act', async () => {
    for (const role of walkers.filter((candidate) => !may(candidate, act)))
      expect([role, (await ask(actors.get(role) as Actor, route, sampleOf(name, own))).status]).toEqual([role, 403]);
  });

  test('shows other sites and other records to nobody', async () => {
    for (const role of walkers.filter((candidate) => may(candidate, act))) {
      const strangers = role === 'participant' || role === 'invitee' ? [other, neighbour] : [other];
      for (const stranger of strangers) {
        const sample = sampleOf(name, stranger);
        const { status, text } = await ask(actors.get(role) as Actor, route, sample);
        if (!sample.isList) expect([role, status, text.slice(0, 200)]).toEqual([role, 404, expect.any(String)]);
        expect(text).not.toContain(stranger.participant.code);
        expect(text).not.toContain(stranger.participant.id);
      }
    }
  });

  test('lets those who may reach their own', async () => {
    for (const role of walkers.filter((candidate) => may(candidate, act))) {
      const { status, text } = await ask(actors.get(role) as Actor, route, sampleOf(name, own));
      // What the record allows now is another question (409, 412, 422, 423); a fault is never an answer.
      expect([role, status >= 500 || [401, 403].includes(status) || (status === 404 && !mayBeAbsent.has(name)), text.slice(0, 300)]).toEqual([role, false, expect.any(String)]);
    }
  });
});

/** Files that do not exist yet in this scene. */
const mayBeAbsent = new Set(['GET /api/consents/{id}/file/{which}', 'GET /api/consents/{id}', 'GET /api/extracts/{id}/files/{name}']);
