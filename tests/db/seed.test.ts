import { randomBytes } from 'node:crypto';
import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest';
import { ParticipantSchema } from '@/entities/participant';
import { SiteSchema } from '@/entities/site';
import type { Actor } from '@/lib/auth/roles';
import { recompute } from '@/lib/measurement/recompute';
import { judgeRecord } from '@/lib/training/judge-record';
import { loadTrainingRecord } from '@/lib/training/training-record';
import { getOrm } from '@/lib/work/orm';
import { withWork } from '@/lib/work/with-work';
import { finalRows } from '@/scripts/demo/events';
import { people, studyEvents } from '@/scripts/demo/generate';
import { layOut } from '@/scripts/demo/plan';
import { demoDefaults, seedStudy, stateOf } from '@/scripts/demo/seed-study';

const now = new Date('2027-03-03T10:40:00Z');
const participants = 40;
const options = { seed: demoDefaults.seed, now, participants, light: false };
/** What the study consists of; credentials hold salted hashes, the trail its own transaction numbers. */
const mainTables = ['site', 'participant', 'screening', 'consent', 'consent_signature', 'visit', 'limb_assessment', 'limb_trial', 'questionnaire_response', 'training_session', 'training_set', 'training_flag', 'symptom_report', 'data_query', 'query_message', 'verification', 'role_grant'];

let owner: Client;
let twin: Client;
let app: Client;
const twinName = `w_${randomBytes(6).toString('hex')}`;

const connect = async (connectionString: string | undefined): Promise<Client> => {
  const client = new Client({ connectionString });
  await client.connect();
  return client;
};
const at = (url: string, database: string): string => Object.assign(new URL(url), { pathname: `/${database}` }).href;
const one = async <Row extends object>(client: Client, text: string, values: unknown[] = []): Promise<Row> => (await client.query<Row>(text, values)).rows[0] as Row;

beforeAll(async () => {
  const { ownerUrl, template } = inject('database');
  const admin = await connect(ownerUrl);
  await admin.query(`create database ${twinName} template ${template} strategy file_copy`);
  await admin.end();
  owner = await connect(process.env['OWNER_DATABASE_URL']);
  twin = await connect(at(ownerUrl, twinName));
  app = await connect(process.env['DATABASE_URL']);
  await seedStudy(owner, options);
}, 400_000);

afterAll(async () => {
  await Promise.all([owner.end(), twin.end(), app.end(), (await getOrm()).close()]);
  const admin = await connect(inject('database').ownerUrl);
  await admin.query(`drop database if exists ${twinName} with (force)`);
  await admin.end();
});

async function checksum(client: Client): Promise<Record<string, string>> {
  const sums: Record<string, string> = {};
  for (const table of mainTables) {
    // Running numbers issued by the data base follow the order of events and belong to the sum.
    const { sum } = await one<{ sum: string }>(client, `select md5(coalesce(string_agg(to_jsonb(t)::text, '' order by t.id), '')) as sum from ${table} t`);
    sums[table] = sum;
  }
  return sums;
}

test('every consent signed on a screen has its copy asked for, behind the work of the day and without a letter', async () => {
  const { asked, quiet } = await one<{ asked: number; quiet: number }>(owner, `select count(*)::int as asked, (count(*) filter (where data ->> 'letter' = 'none' and priority < 0))::int as quiet from pgboss.job where name = 'consent.copy'`);
  const { complete } = await one<{ complete: number }>(owner, `select count(*)::int as complete from consent where state = 'complete' and mode <> 'paper'`);
  expect(complete).toBeGreaterThan(0);
  expect([asked, quiet]).toEqual([complete, complete]);
});

describe('the seed', () => {
  test('fills every table with what the generator tells, and says that it is whole', async () => {
    const plan = layOut({ ...options, logWeeks: 200 });
    const told = finalRows([...studyEvents(plan), ...[...people(plan)].flatMap(({ events }) => events)]);
    for (const [table, rows] of told) {
      const { n } = await one<{ n: number }>(owner, `select count(*)::int as n from ${table}`);
      const extra = table === 'account' ? 2 : 0; // The two that the migrations make.
      expect([table, n]).toEqual([table, rows.length + extra]);
    }
    expect(await stateOf(owner)).toBe('seeded');
    expect(await stateOf(twin)).toBe('empty');
  });

  test('gives the same study to another data base, row for row', async () => {
    await seedStudy(twin, options);
    expect(await checksum(twin)).toEqual(await checksum(owner));
  }, 400_000);

  test('leaves a trail that tells each act by its doer, at its time', async () => {
    const trail = await one<{ first: Date; last: Date; roles: string[]; acts: number }>(
      owner,
      `select min(at) as first, max(at) filter (where op <> 'EVENT') as last, array_agg(distinct role order by role) as roles, count(distinct act)::int as acts from audit_entry where act not in ('study.migrate')`,
    );
    expect(trail.first.getTime()).toBeLessThan(now.getTime() - 700 * 86_400_000);
    expect(trail.last.getTime()).toBeLessThanOrEqual(now.getTime());
    expect(trail.roles).toEqual(expect.arrayContaining(['assessor', 'invitee', 'monitor', 'participant', 'site-coordinator', 'site-investigator', 'system']));
    expect(trail.acts).toBeGreaterThan(25);
    const { backwards } = await one<{ backwards: number }>(
      owner,
      `select count(*)::int as backwards from (select at, lag(at) over (order by id) as before from audit_entry where act not in ('study.migrate') and op <> 'EVENT') t where at < before`,
    );
    expect(backwards).toBe(0);
  });

  test('lets a mark fall when its value changes, at the time of the change', async () => {
    const { rows } = await owner.query<{ fell_at: Date; at: Date; reason: string | null }>(
      `select v.fell_at, e.at, e.reason from verification v join audit_entry e on e.row_id = v.target_id::text and e.op = 'UPDATE' and e.at = v.fell_at where v.fell_at is not null`,
    );
    expect(rows.length).toBeGreaterThan(0);
    expect(rows.every(({ reason }) => reason !== null)).toBe(true);
  });
});

describe('the application, when it judges the seeded record again,', () => {
  /** A coordinator of the first site, as signing in would make one. */
  const coordinator = async (): Promise<Actor> => {
    const grant = await one<{ account_id: string; label: string; study_id: string; site_ids: string[] }>(owner, `select account_id, label, study_id, site_ids from role_grant where label = 'C-03'`);
    return { accountId: grant.account_id, role: 'site-coordinator', label: grant.label, studyId: grant.study_id, reach: grant.site_ids, participantId: null, screeningId: null };
  };
  const all = async (): Promise<{ id: string; site_id: string }[]> => (await owner.query<{ id: string; site_id: string }>(`select p.id, p.site_id from participant p join site s on s.id = p.site_id where s.code = 'NM' order by p.code`)).rows;
  const sumOf = (table: string): Promise<{ sum: string; n: number }> => one(owner, `select md5(string_agg(to_jsonb(t)::text, '' order by t.id)) as sum, count(*)::int as n from ${table} t`);

  test('finds the same volumes, changes and verdicts', async () => {
    const before = await sumOf('limb_assessment');
    const actor = await coordinator();
    for (const { id } of await all()) {
      const { n } = await one<{ n: number }>(owner, `select count(*)::int as n from limb_assessment where participant_id = $1 and state = 'complete'`, [id]);
      if (n > 0) await withWork(actor, 'assessment.correct', (work) => recompute(work, id));
    }
    expect(before.n).toBeGreaterThan(50);
    expect(await sumOf('limb_assessment')).toEqual(before);
  });

  test('raises the same flags, no more and no fewer', async () => {
    const before = await sumOf('training_flag');
    const actor = await coordinator();
    for (const { id, site_id } of await all()) {
      await withWork(actor, 'participant.correct', async (work) => {
        const participant = await work.em.findOneOrFail(ParticipantSchema, { id });
        const site = await work.em.findOneOrFail(SiteSchema, { id: site_id });
        const record = await loadTrainingRecord(work, { id, protocolVersionId: participant.protocolVersionId, timeZone: site.timeZone });
        await judgeRecord(work, { participant, site, today: '2027-03-03' }, record);
      });
    }
    expect(before.n).toBeGreaterThan(10);
    expect(await sumOf('training_flag')).toEqual(before);
  });
});

describe('the clock of the trail', () => {
  const act = async (client: Client): Promise<void> => {
    await client.query('begin');
    await client.query(`select set_config('app.actor', '00000000-0000-4000-8000-000000000001', true), set_config('app.role', 'system', true), set_config('app.act', 'demo.seed', true), set_config('app.clock', '2020-01-01T00:00:00Z', true)`);
    await client.query(`select audit_event('study', 'clock', '{}'::jsonb, null, null)`);
    await client.query('commit');
  };
  const newest = (): Promise<{ at: Date; recent: boolean }> => one(owner, `select at, at > now() - interval '5 minutes' as recent from audit_entry where row_id = 'clock' order by id desc limit 1`);

  test('cannot be set back by the application', async () => {
    await act(app);
    expect((await newest()).recent).toBe(true);
  });

  test('cannot be set back by the application through another of its roles', async () => {
    await app.query('set role app_rw');
    await act(app);
    await app.query('reset role');
    expect((await newest()).recent).toBe(true);
  });

  test('obeys the owner of the tables, who loads what happened before', async () => {
    await act(owner);
    expect((await newest()).at.toISOString()).toBe('2020-01-01T00:00:00.000Z');
  });
});
