import { beforeAll, describe, expect, test } from 'vitest';
import type { z } from 'zod';
import { addDays, daysBetween } from '@/instruments/calendar';
import { todayKinds, viewTodayInput } from '@/lib/today/input';
import { viewToday, type TodayView } from '@/lib/today/view-today';
import { workGroups, type WorkGroupKey } from '@/lib/today/work-groups';
import { withWork } from '@/lib/work/with-work';
import { givenConsent, givenParticipant, givenScene, givenScreening, type GivenParticipant, type GivenScene } from '../given';
import { givenQueries, givenReports, givenVisit } from '../given-work';

/** A Wednesday in London's winter: local days are UTC days, and the eight weeks shown end 32 days on, on Sunday 4 April. */
const today = '2027-03-03';
const now = new Date(`${today}T10:00:00Z`);
const daysShown = 32;

let scene: GivenScene;
const view = (input: z.input<typeof viewTodayInput> = {}): Promise<TodayView> => withWork(scene.coordinator, 'today.view', (work) => viewToday(work, viewTodayInput.parse(input)), { now });
const groupOf = ({ groups }: TodayView, key: WorkGroupKey) => {
  const group = groups.find((each) => each.key === key);
  if (!group) throw new Error(`There is no group ${key}.`);
  return group;
};

/** A schedule that asks for nothing for two years. */
const nothingYet = { visits: [{ key: 'baseline', name: 'Baseline', offsetDays: 730, earlyDays: 0, lateDays: 28, questionnaires: [] }] };
/** Somebody whose own schedule asks for nothing yet. */
const givenNobodyDue = (): Promise<GivenParticipant> => givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-01-01' });

/** All rows of a group, page after page, until a page says it is not the one asked for. */
async function pagesOf(input: { kind?: (typeof todayKinds)[number]; group: WorkGroupKey }): Promise<string[][]> {
  const pages: string[][] = [];
  for (;;) {
    const asked = await view({ ...input, page: pages.length });
    if (asked.shown.page !== pages.length) return pages;
    pages.push(groupOf(asked, input.group).items.map(({ kind, id }) => `${kind} ${id}`));
  }
}

describe('the day a visit asks for', () => {
  interface Plan {
    readonly state: 'to come' | 'in progress';
    readonly bookedOn: string | null;
    readonly targetOn: string;
    readonly closesOn: string;
  }

  /** The rule in words, one after the other: the slow twin of the data base's. */
  function dueDay({ state, bookedOn, targetOn, closesOn }: Plan): string {
    if (state === 'in progress') return today;
    if (bookedOn !== null && bookedOn >= today) return bookedOn;
    if (closesOn < today) return closesOn;
    if (bookedOn !== null) return today;
    return targetOn >= today ? targetOn : closesOn;
  }
  function groupOfDay(dueOn: string): WorkGroupKey | null {
    const ahead = daysBetween({ from: today, to: dueOn });
    if (ahead > daysShown) return null;
    if (ahead < 0) return 'late';
    if (ahead === 0) return 'today';
    return ahead <= 7 ? 'week' : 'later';
  }

  const from = (days: number): string => addDays(today, days);
  const plans: Plan[] = (['to come', 'in progress'] as const).flatMap((state) =>
    [null, -3, 0, 1, 7, 8, daysShown, daysShown + 1].flatMap((booked) =>
      [-30, -1, 0, 7, 8, daysShown, daysShown + 1].flatMap((target) =>
        [0, 1, 40].map((open) => ({ state, bookedOn: booked === null ? null : from(booked), targetOn: from(target), closesOn: from(target + open) })),
      ),
    ),
  );
  const expected = new Map<string, { dueOn: string; group: WorkGroupKey }>();
  let bookings: string[] = [];

  beforeAll(async () => {
    scene = await givenScene(nothingYet);
    const participant = await givenNobodyDue();
    for (const [index, plan] of plans.entries()) {
      const { id } = await givenVisit(participant, scene.protocol, { ...plan, key: `plan-${index}`, bookedAt: plan.bookedOn === null ? null : `${plan.bookedOn}T09:30:00Z` });
      const dueOn = dueDay(plan);
      const group = groupOfDay(dueOn);
      if (group) expected.set(`visit ${id}`, { dueOn, group });
    }
    bookings = plans.flatMap(({ bookedOn }) => (bookedOn !== null && bookedOn >= today ? [bookedOn] : []));
  });

  test('is the same for every state, booking and window as worked out by hand', async () => {
    const found = new Map<string, { dueOn: string; group: WorkGroupKey }>();
    for (const group of workGroups)
      for (let page = 0; ; page += 1) {
        const asked = await view({ group, page });
        if (asked.shown.page !== page) break;
        for (const { kind, id, dueOn } of groupOf(asked, group).items) found.set(`${kind} ${id}`, { dueOn, group });
      }
    expect(expected.size).toBeGreaterThan(200);
    expect(found.size).toBe(expected.size);
    for (const [id, due] of expected) expect([id, found.get(id)]).toEqual([id, due]);
  });

  test('the chair counts every booking by day, whatever the list shows', async () => {
    const days = [...new Set(bookings)].sort().map((on) => ({ on, visits: bookings.filter((day) => day === on).length, first: `${on}T09:30:00.000Z`, timeZone: 'Europe/London' }));
    expect(days.length).toBeGreaterThan(5);
    for (const input of [{}, { kind: 'query' }, { group: 'late', page: 1 }] as const) expect((await view(input)).chair).toEqual(days);
  });

  test('its bookings stand first in their day, by the hour', async () => {
    const participant = await givenNobodyDue();
    const [later, sooner] = await Promise.all(['15:00', '11:15'].map((time) => givenVisit(participant, scene.protocol, { key: `at-${time}`, targetOn: from(5), closesOn: from(9), bookedAt: `${from(5)}T${time}:00Z` })));
    const [query] = await givenQueries(participant, scene.coordinator, { count: 1, dueOn: from(5) });
    expect(groupOf(await view(), 'week').items.flatMap(({ dueOn, id }) => (dueOn === from(5) ? [id] : []))).toEqual([sooner?.id, later?.id, query]);
  });
});

describe('a long day', () => {
  /** How many queries are due so many days from today, and the group by hand. */
  const plan: readonly (readonly [days: number, count: number, group: WorkGroupKey])[] = [
    [-40, 60, 'late'], [-1, 62, 'late'], [0, 51, 'today'], [1, 3, 'week'], [7, 4, 'week'], [8, 50, 'later'], [400, 1, 'later'],
  ];
  const queries = new Map<WorkGroupKey, string[]>();
  let urgent: string[] = [];
  let overdue: string[] = [];

  beforeAll(async () => {
    scene = await givenScene(nothingYet);
    const [one, two] = [await givenNobodyDue(), await givenNobodyDue()];
    for (const [days, count, group] of plan) {
      // Two people share each day's queries; every one of them has the same due day, no hour and one of two codes.
      const half = Math.floor(count / 2);
      const ids = [...(await givenQueries(one, scene.coordinator, { count: half, dueOn: addDays(today, days) })), ...(await givenQueries(two, scene.coordinator, { count: count - half, dueOn: addDays(today, days) }))];
      queries.set(group, [...(queries.get(group) ?? []), ...ids.map((id) => `query ${id}`)]);
    }
    for (const count of [1, 2]) await givenConsent(await givenScreening(scene.site, scene.protocol, { name: `Ada Example ${count}` }), scene.protocol, scene.coordinator, 'signed by participant');
    urgent = await givenReports(one, { count: 53, level: 'R1', dueAt: '2027-03-03T11:00:00Z' });
    overdue = await givenReports(two, { count: 2, level: 'S1', dueAt: '2027-03-03T09:59:59Z' });
    await givenReports(two, { count: 1, level: 'R4', dueAt: '2027-03-03T10:00:01Z' });
    await givenVisit(two, scene.protocol, { key: 'extra', targetOn: today, closesOn: addDays(today, 3) });
  });

  test('shows the first 50 of each group and how many there are', async () => {
    const { groups, shown } = await view();
    expect(groups.map(({ key, count, items }) => [key, count, items.length])).toEqual([
      ['late', 124, 50],
      ['today', 55, 50],
      ['week', 7, 7],
      ['later', 51, 50],
    ]);
    expect(shown).toEqual({ kind: 'all', group: null, page: 0, pageSize: 50 });
  });

  test('counts every kind, and every kind in every group, whatever is shown', async () => {
    const counts = { all: 290, visit: 1, query: 231, report: 56, consent: 2, questionnaire: 0 };
    const byGroup = { all: [124, 55, 7, 51], visit: [0, 1, 0, 0], query: [122, 51, 7, 51], report: [2, 1, 0, 0], consent: [0, 2, 0, 0], questionnaire: [0, 0, 0, 0] };
    for (const kind of todayKinds)
      for (const input of [{ kind }, { kind, group: 'week' as const }]) {
        const asked = await view(input);
        expect(asked.counts).toEqual(counts);
        expect(asked.groups.map(({ count }) => count)).toEqual(byGroup[kind]);
        expect(asked.groups.flatMap(({ items }) => items.map((item) => item.kind)).filter((found) => kind !== 'all' && found !== kind)).toEqual([]);
      }
  });

  test('a group alone is paged, and its pages hold every piece of work once', async () => {
    for (const kind of ['all', 'query'] as const)
      for (const group of workGroups) {
        const pages = await pagesOf({ kind, group });
        const { count, items } = groupOf(await view({ kind }), group);
        const rows = pages.flat();
        expect(pages.slice(0, -1).map((page) => page.length)).toEqual(pages.slice(0, -1).map(() => 50));
        expect(rows.length).toBe(count);
        expect(new Set(rows).size).toBe(count);
        expect(items.map((item) => `${item.kind} ${item.id}`)).toEqual(rows.slice(0, 50));
        // Same day, no hour: by code, then by the query's number, which is the order in which they were raised.
        expect(rows.filter((row) => row.startsWith('query'))).toEqual(queries.get(group));
        expect(await pagesOf({ kind, group })).toEqual(pages);
      }
  });

  test('a page of a group shows that group only, and one beyond the end is the last', async () => {
    const last = await view({ group: 'late', page: 2 });
    expect(last.groups.map(({ items }) => items.length)).toEqual([24, 0, 0, 0]);
    const beyond = await view({ group: 'late', page: 99_999 });
    expect(beyond.shown).toEqual({ kind: 'all', group: 'late', page: 2, pageSize: 50 });
    expect(groupOf(beyond, 'late').items).toEqual(groupOf(last, 'late').items);
    const none = await view({ kind: 'questionnaire', group: 'late', page: 7 });
    expect([none.shown.page, none.groups.flatMap(({ items }) => items)]).toEqual([0, []]);
  });

  test('a clock that ran out today is late; urgent reports stand above, 50 at most, all of them counted', async () => {
    const late = await pagesOf({ kind: 'report', group: 'late' });
    expect(new Set(late.flat())).toEqual(new Set(overdue.map((id) => `report ${id}`)));
    for (const input of [{}, { kind: 'query' }, { group: 'later', page: 1 }] as const) {
      const asked = await view(input);
      expect([asked.urgent.length, asked.urgentCount]).toEqual([50, 53]);
      expect(asked.urgent.filter(({ id }) => !urgent.includes(id))).toEqual([]);
    }
  });

  test.each([{ page: 1 }, { group: 'soon' }, { group: 'late', page: -1 }, { group: 'late', page: 0.5 }, { kind: 'letter' }, { group: 'late', pageSize: 5000 }])('refuses %j', (input) => {
    expect(viewTodayInput.safeParse(input).success).toBe(false);
  });
});
