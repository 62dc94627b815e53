import type { Actor } from '@/lib/auth/roles';
import { only, setScene, type GivenParticipant, type GivenProtocol } from './given';

/** One more visit in somebody's schedule. */
export async function givenVisit(
  { id, siteId }: GivenParticipant,
  protocol: GivenProtocol,
  visit: { key: string; targetOn: string; closesOn: string; bookedAt?: string | null; state?: 'to come' | 'in progress' },
): Promise<{ id: string }> {
  const { key, targetOn, closesOn, bookedAt = null, state = 'to come' } = visit;
  return setScene([siteId], async (work) =>
    only(
      await work.sql<{ id: string }>(
        `insert into visit (site_id, participant_id, key, name, target_on, opens_on, closes_on, booked_at, state, done_on, protocol_version_id)
         values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?) returning id`,
        [siteId, id, key, `Visit ${key}`, targetOn, targetOn, closesOn, bookedAt, state, state === 'in progress' ? targetOn : null, protocol.id],
      ),
    ),
  );
}

/** Open queries on the day of the baseline visit, raised one minute after the other. Their ids in that order. */
export async function givenQueries({ id, siteId, visits }: GivenParticipant, by: Actor, { count, dueOn }: { count: number; dueOn: string }): Promise<string[]> {
  const rows = await setScene([siteId], (work) =>
    work.sql<{ id: string; raised_at: string }>(
      `insert into data_query (site_id, participant_id, visit_id, target_table, target_id, field, field_label, origin, raised_by, raised_at, due_on)
       select ?, ?, ?, 'visit', ?, 'done_on', 'date of visit', 'manual', ?, '2027-01-10T09:00:00Z'::timestamptz + n * interval '1 minute', ? from generate_series(1, ?::int) n order by n returning id, raised_at::text`,
      [siteId, id, visits['baseline'], visits['baseline'], by.accountId, dueOn, count],
    ),
  );
  return rows.map((row) => row.id);
}

/** Symptom reports of one level, all with the same clock. */
export async function givenReports(
  { id, siteId }: GivenParticipant,
  { count, level, dueAt, state = 'new' }: { count: number; level: string; dueAt: string; state?: 'new' | 'read' },
): Promise<string[]> {
  const rows = await setScene([siteId], (work) =>
    work.sql<{ id: string }>(
      `insert into symptom_report (site_id, participant_id, reported_at, noticed_on, answers, level, due_at, hold_training, state, client_key)
       select ?, ?, '2027-01-20T07:52:00Z', '2027-01-20', '{"signs":["fever"],"lastedOverADay":null,"soreness":null}'::jsonb, ?, ?, true, ?, gen_random_uuid() from generate_series(1, ?::int) returning id`,
      [siteId, id, level, dueAt, state, count],
    ),
  );
  return rows.map((row) => row.id);
}
