import { expect, test } from 'vitest';
import { groupOf } from '@/lib/today/group-of';
import { viewTodayInput } from '@/lib/today/input';
import { viewToday, type TodayView } from '@/lib/today/view-today';
import { withWork } from '@/lib/work/with-work';
import type { Actor } from '@/lib/auth/roles';
import { countStatements } from '../count-statements';
import { givenConsent, givenParticipant, givenProtocol, givenScene, givenScreening, givenSite, givenStaff, givenStudy, setScene } from '../given';

const all = viewTodayInput.parse({});
const todayAt = (actor: Actor, now: string, kind = all): Promise<TodayView> => withWork(actor, 'today.view', (work) => viewToday(work, kind), { now: new Date(now) });
const items = (view: TodayView, key: string) => view.groups.find((group) => group.key === key)?.items ?? [];

test('a due day falls in its group by whole days', () => {
  const today = '2027-03-03';
  expect(['2027-03-02', '2027-03-03', '2027-03-04', '2027-03-10', '2027-03-11'].map((dueOn) => groupOf({ dueOn, today }))).toEqual(['late', 'today', 'week', 'week', 'later']);
});

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

test('another site’s work never appears, and the statements do not grow with the participants', async () => {
  const { site, otherSite, protocol, coordinator, otherCoordinator } = await givenScene();
  const own = await givenParticipant(site, protocol, coordinator);
  const other = await givenParticipant(otherSite, protocol, otherCoordinator);
  const screening = await givenScreening(site, protocol, { confirmedBy: coordinator });
  await givenConsent(screening, protocol, coordinator, 'signed by participant');
  await setScene([site.id, otherSite.id], async (work) => {
    for (const participant of [own, other])
      await work.sql(
        `insert into data_query (site_id, participant_id, visit_id, target_table, target_id, field, field_label, origin, raised_by, raised_at, due_on)
         values (?, ?, ?, 'visit', ?, 'done_on', 'date of visit', 'manual', ?, '2027-01-10T09:00:00Z', '2027-01-24')`,
        [participant.siteId, participant.id, participant.visits['baseline'], participant.visits['baseline'], coordinator.accountId],
      );
  });
  const now = new Date('2027-01-20T10:00:00Z');
  const one = await withWork(coordinator, 'today.view', (work) => countStatements(work, (counted) => viewToday(counted, all)), { now });
  const codes = new Set(one.result.groups.flatMap((group) => group.items.map(({ code }) => code)));
  expect(codes).toContain(own.code);
  expect(codes).not.toContain(other.code);
  expect(one.result.counts).toMatchObject({ query: 1, consent: 1 });
  for (let count = 0; count < 12; count += 1) await givenParticipant(site, protocol, coordinator);
  const many = await withWork(coordinator, 'today.view', (work) => countStatements(work, (counted) => viewToday(counted, all)), { now });
  expect(many.result.counts.visit).toBe(one.result.counts.visit + 12);
  expect(many.statements).toBe(one.statements);
});

test('a red-flag report stands above the list until it is read, then in it with its clock', async () => {
  const { site, protocol, coordinator } = await givenScene();
  const participant = await givenParticipant(site, protocol, coordinator);
  const report = async (state: 'new' | 'read') =>
    setScene([site.id], async (work) => {
      const [row] = await work.sql<{ id: string }>(
        `insert into symptom_report (site_id, participant_id, reported_at, noticed_on, answers, level, due_at, hold_training, state, client_key)
         values (?, ?, '2027-01-20T07:52:00Z', '2027-01-20', '{"signs":["fever"],"lastedOverADay":null,"soreness":null}'::jsonb, 'R1', '2027-01-20T11:52:00Z', true, ?, gen_random_uuid()) returning id`,
        [site.id, participant.id, state],
      );
      return row?.id;
    });
  const unread = await report('new');
  const read = await report('read');
  const view = await todayAt(coordinator, '2027-01-20T10:40:00Z', { kind: 'query' });
  expect(view.urgent.map(({ id }) => id)).toEqual([unread]);
  const late = await todayAt(coordinator, '2027-01-20T12:00:00Z');
  expect(items(late, 'late').flatMap((item) => (item.kind === 'report' ? [item.id] : []))).toEqual([read]);
});
