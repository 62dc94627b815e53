import { expect, test } from 'vitest';
import type { z } from 'zod';
import { viewTodayInput } from '@/lib/today/input';
import { viewToday, type TodayView } from '@/lib/today/view-today';
import { withWork } from '@/lib/work/with-work';
import type { Actor } from '@/lib/auth/roles';
import { countStatements } from '../count-statements';
import { givenConsent, givenParticipant, givenProtocol, givenScene, givenScreening, givenSite, givenStaff, givenStudy, setScene } from '../given';
import { givenQueries, givenReports, givenVisit } from '../given-work';

const all = viewTodayInput.parse({});
const todayAt = (actor: Actor, now: string, input: z.input<typeof viewTodayInput> = {}): Promise<TodayView> =>
  withWork(actor, 'today.view', (work) => viewToday(work, viewTodayInput.parse(input)), { now: new Date(now) });
const items = (view: TodayView, key: string) => view.groups.find((group) => group.key === key)?.items ?? [];

test('the day turns at midnight of the site, not of UTC', async () => {
  const study = await givenStudy();
  const site = await givenSite(study, { timeZone: 'Australia/Hobart' });
  const protocol = await givenProtocol(study);
  const coordinator = await givenStaff('site-coordinator', site);
  // Baseline on 6 January with 28 days of grace: its window closes on 3 February.
  await givenParticipant(site, protocol, coordinator, { enrolledOn: '2027-01-06' });
  // Hobart stands 11 hours ahead in summer: 12:59 UTC is 23:59 of 3 February there, 13:00 UTC is the next day.
  const before = await todayAt(coordinator, '2027-02-03T12:59:00Z');
  expect(before.today).toBe('2027-02-03');
  expect(items(before, 'today').map(({ kind }) => kind)).toContain('visit');
  expect(items(before, 'late').filter(({ kind }) => kind === 'visit')).toEqual([]);
  const after = await todayAt(coordinator, '2027-02-03T13:00:00Z');
  expect(after.today).toBe('2027-02-04');
  expect(items(after, 'late').map(({ kind, dueOn }) => [kind, dueOn])).toEqual([['visit', '2027-02-03']]);
});

test('another site’s work never appears, and the statements do not grow with the work', async () => {
  const { site, otherSite, protocol, coordinator, otherCoordinator } = await givenScene();
  const own = await givenParticipant(site, protocol, coordinator);
  const other = await givenParticipant(otherSite, protocol, otherCoordinator);
  const screening = await givenScreening(site, protocol, { confirmedBy: coordinator });
  await givenConsent(screening, protocol, coordinator, 'signed by participant');
  for (const participant of [own, other]) await givenQueries(participant, coordinator, { count: 1, dueOn: '2027-01-24' });
  const now = new Date('2027-01-20T10:00:00Z');
  const one = await withWork(coordinator, 'today.view', (work) => countStatements(work, (counted) => viewToday(counted, all)), { now });
  const codes = new Set(one.result.groups.flatMap((group) => group.items.map(({ code }) => code)));
  expect(codes).toContain(own.code);
  expect(codes).not.toContain(other.code);
  expect(one.result.counts).toMatchObject({ query: 1, consent: 1 });
  await givenQueries(own, coordinator, { count: 300, dueOn: '2027-01-24' });
  const many = await withWork(coordinator, 'today.view', (work) => countStatements(work, (counted) => viewToday(counted, all)), { now });
  expect(many.result.counts.query).toBe(301);
  expect(many.statements).toBe(one.statements);
});

test('two sites on two sides of midnight each have their own today', async () => {
  const study = await givenStudy();
  const auckland = await givenSite(study, { name: 'Auckland', timeZone: 'Pacific/Auckland' });
  const london = await givenSite(study, { name: 'London', timeZone: 'Europe/London' });
  // Their own schedule asks for nothing yet.
  const protocol = await givenProtocol(study, { visits: [{ key: 'baseline', name: 'Baseline', offsetDays: 730, earlyDays: 0, lateDays: 28, questionnaires: [] }] });
  const both = await givenStaff('site-coordinator', [auckland, london]);
  for (const site of [auckland, london]) {
    const participant = await givenParticipant(site, protocol, both, { enrolledOn: '2027-01-01' });
    await givenQueries(participant, both, { count: 1, dueOn: '2027-07-01' });
    await givenVisit(participant, protocol, { key: 'extra', targetOn: '2027-07-01', closesOn: '2027-07-20', bookedAt: '2027-07-01T22:30:00Z' });
  }
  const at = async (now: string) =>
    (await todayAt(both, now)).groups.flatMap(({ key, items: rows }) => rows.map(({ kind, siteName, today, dueOn }) => [key, siteName, kind, today, dueOn])).sort((a, b) => String(a).localeCompare(String(b)));
  // Auckland stands 12 hours ahead in its winter, London one in its summer. 11:59 UTC is 23:59 of 1 July in Auckland.
  expect(await at('2027-07-01T11:59:00Z')).toEqual([
    ['today', 'Auckland', 'query', '2027-07-01', '2027-07-01'],
    ['today', 'London', 'query', '2027-07-01', '2027-07-01'],
    ['today', 'London', 'visit', '2027-07-01', '2027-07-01'],
    ['week', 'Auckland', 'visit', '2027-07-01', '2027-07-02'],
  ]);
  expect(await at('2027-07-01T12:00:00Z')).toEqual([
    ['late', 'Auckland', 'query', '2027-07-02', '2027-07-01'],
    ['today', 'Auckland', 'visit', '2027-07-02', '2027-07-02'],
    ['today', 'London', 'query', '2027-07-01', '2027-07-01'],
    ['today', 'London', 'visit', '2027-07-01', '2027-07-01'],
  ]);
  // 22:59 UTC is 23:59 in London, and the appointment of 23:30 there has just passed without the visit having begun.
  expect((await at('2027-07-01T22:59:00Z')).filter(([, site]) => site === 'London').map(([group]) => group)).toEqual(['today', 'today']);
  expect((await at('2027-07-01T23:00:00Z')).filter(([, site]) => site === 'London').map(([group, , kind]) => [group, kind])).toEqual([
    ['late', 'query'],
    ['today', 'visit'],
  ]);
  const { chair } = await todayAt(both, '2027-07-01T12:00:00Z');
  expect(chair).toEqual([
    { on: '2027-07-01', visits: 1, first: '2027-07-01T22:30:00.000Z', timeZone: 'Europe/London' },
    { on: '2027-07-02', visits: 1, first: '2027-07-01T22:30:00.000Z', timeZone: 'Pacific/Auckland' },
  ]);
});

test('who left has no visits and no questionnaires due, unless only the training was stopped; queries stay', async () => {
  const { site, protocol, coordinator } = await givenScene();
  const grades = ['stops training', 'no visits', 'no further data'] as const;
  const left = new Map<string, string>();
  for (const grade of grades) {
    const participant = await givenParticipant(site, protocol, coordinator);
    await givenQueries(participant, coordinator, { count: 1, dueOn: '2027-01-24' });
    await setScene([site.id], (work) => work.sql(`update participant set state = 'withdrawn', left_on = '2027-01-10', left_grade = ? where id = ?`, [grade, participant.id]));
    left.set(participant.code, grade);
  }
  const view = await todayAt(coordinator, '2027-01-20T10:00:00Z');
  const gradesOf = (kind: string) => [...new Set(view.groups.flatMap((group) => group.items.filter((item) => item.kind === kind).map(({ code }) => left.get(code))))].sort();
  expect(gradesOf('visit')).toEqual(['stops training']);
  expect(gradesOf('questionnaire')).toEqual(['stops training']);
  expect(gradesOf('query')).toEqual([...grades].sort());
});

test('a red-flag report stands above the list until it is read, then in it with its clock', async () => {
  const { site, protocol, coordinator } = await givenScene();
  const participant = await givenParticipant(site, protocol, coordinator);
  const report = async (state: 'new' | 'read') => (await givenReports(participant, { count: 1, level: 'R1', dueAt: '2027-01-20T11:52:00Z', state }))[0];
  const unread = await report('new');
  const read = await report('read');
  const view = await todayAt(coordinator, '2027-01-20T10:40:00Z', { kind: 'query' });
  expect(view.urgent.map(({ id }) => id)).toEqual([unread]);
  const late = await todayAt(coordinator, '2027-01-20T12:00:00Z');
  expect(items(late, 'late').flatMap((item) => (item.kind === 'report' ? [item.id] : []))).toEqual([read]);
});
