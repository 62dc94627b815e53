import { beforeEach, expect, test } from 'vitest';
import { findUnsent, sweepUnsent, unsentShape, type Shelf, type Unsent, type UnsentKind } from '@/components/phone/unsent';

/** A shelf in memory that takes copies, as a device does: one entry for each owner and kind. */
function memoryShelf(): Shelf {
  const entries = new Map<string, Unsent>();
  const place = (owner: string, kind: UnsentKind): string => JSON.stringify([owner, kind]);
  return {
    all: () => Promise.resolve([...entries.values()].map((entry) => structuredClone(entry))),
    put: (entry) => Promise.resolve(void entries.set(place(entry.owner, entry.kind), structuredClone(entry))),
    remove: (owner, kind) => Promise.resolve(void entries.delete(place(owner, kind))),
  };
}

const now = new Date('2027-03-03T10:00:00Z');
const daysBefore = (days: number): Date => new Date(now.getTime() - days * 86_400_000);
const entry = (change: Partial<Unsent> = {}): Unsent => ({ shape: unsentShape, owner: 'ada', kind: 'session', key: 'k-1', keptAt: now, value: { loadKg: 6 }, ...change });

let shelf: Shelf;
beforeEach(() => {
  shelf = memoryShelf();
});

test('what somebody left is found again, under the key it is sent with', async () => {
  await shelf.put(entry());
  expect(await findUnsent(shelf, 'ada', 'session', now)).toEqual(entry());
  expect(await findUnsent(shelf, 'ada', 'report', now)).toBeNull();
});

test('nobody else finds it', async () => {
  await shelf.put(entry());
  expect(await findUnsent(shelf, 'grace', 'session', now)).toBeNull();
});

test('another person’s sign-in removes it; the own one does not', async () => {
  await shelf.put(entry());
  await shelf.put(entry({ kind: 'report', key: 'k-2' }));
  expect((await sweepUnsent(shelf, 'ada', now)).map(({ kind }) => kind)).toEqual(['session', 'report']);
  expect(await shelf.all()).toHaveLength(2);
  expect(await sweepUnsent(shelf, 'grace', now)).toEqual([]);
  expect(await shelf.all()).toEqual([]);
});

test('signing out, and anybody who is no participant, leaves nothing', async () => {
  await shelf.put(entry());
  expect(await sweepUnsent(shelf, null, now)).toEqual([]);
  expect(await shelf.all()).toEqual([]);
});

test('after two weeks it goes by itself, and is not shown before it went', async () => {
  await shelf.put(entry({ keptAt: daysBefore(13.9) }));
  expect(await findUnsent(shelf, 'ada', 'session', now)).not.toBeNull();
  await shelf.put(entry({ keptAt: daysBefore(14) }));
  expect(await findUnsent(shelf, 'ada', 'session', now)).toBeNull();
  await sweepUnsent(shelf, 'ada', now);
  expect(await shelf.all()).toEqual([]);
});

test('what a page of another making wrote is not read', async () => {
  await shelf.put(entry({ shape: unsentShape + 1 }));
  expect(await findUnsent(shelf, 'ada', 'session', now)).toBeNull();
  expect(await sweepUnsent(shelf, 'ada', now)).toEqual([]);
  expect(await shelf.all()).toEqual([]);
});

test('a later entry takes the place of the one before', async () => {
  await shelf.put(entry());
  await shelf.put(entry({ value: { loadKg: 8 } }));
  expect((await shelf.all()).map(({ value }) => value)).toEqual([{ loadKg: 8 }]);
});
