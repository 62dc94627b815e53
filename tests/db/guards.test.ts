import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';

/** What the data base itself refuses, asked under the application's own login with no service in between. */
let app: Client;
let owner: Client;

beforeAll(async () => {
  app = new Client({ connectionString: process.env['DATABASE_URL'] });
  owner = new Client({ connectionString: process.env['OWNER_DATABASE_URL'] });
  await Promise.all([app.connect(), owner.connect()]);
});
afterAll(async () => {
  await Promise.all([app.end(), owner.end()]);
});

/** Tables of the trade of signing in and of operations, which stand outside the trail; each with its reason in its migration. */
const outsideTheTrail = ['app_session', 'audit_entry', 'idempotency_key', 'rate_hit', 'seal', 'worker_heartbeat'];
/** Where rows may be deleted: throttling forgets. */
const mayDelete = ['rate_hit'];
const migratorsOwn = ['mikro_orm_migrations'];

const tables = async (): Promise<string[]> =>
  (await owner.query<{ relname: string }>(`select relname from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p') order by relname`)).rows
    .map(({ relname }) => relname)
    .filter((name) => !migratorsOwn.includes(name));

describe('every table', () => {
  test('has row-level security, forced, with a policy', async () => {
    const { rows } = await owner.query<{ relname: string }>(
      `select c.relname from pg_class c where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'
       and (not c.relrowsecurity or not c.relforcerowsecurity or not exists (select from pg_policy p where p.polrelid = c.oid))`,
    );
    expect(rows.map(({ relname }) => relname).filter((name) => !migratorsOwn.includes(name))).toEqual([]);
  });

  test('is watched by the audit trail, or named as standing outside it', async () => {
    const { rows } = await owner.query<{ relname: string }>(
      `select c.relname from pg_class c where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'
       and not exists (select from pg_trigger t join pg_proc f on f.oid = t.tgfoid where t.tgrelid = c.oid and f.proname = 'audit_row' and t.tgenabled = 'O')`,
    );
    expect(rows.map(({ relname }) => relname).filter((name) => !migratorsOwn.includes(name)).sort()).toEqual(outsideTheTrail);
  });

  test('keeps its rows: the application deletes nowhere but where forgetting is the point', async () => {
    const { rows } = await owner.query<{ table_name: string }>(
      `select distinct table_name from information_schema.role_table_grants where grantee in ('app_rw', 'app_login') and privilege_type in ('DELETE', 'TRUNCATE') and table_schema = 'public'`,
    );
    expect(rows.map(({ table_name }) => table_name).sort()).toEqual(mayDelete);
  });

  test('shows nothing to a login with no actor', async () => {
    const readable = (await tables()).filter((name) => name !== 'worker_heartbeat');
    for (const table of readable) {
      const { rows } = await app.query<{ n: string }>(`select count(*) as n from ${table}`);
      expect([table, rows[0]?.n]).toEqual([table, '0']);
    }
  });
});

describe('the application login', () => {
  test('owns nothing, is no superuser and does not pass row-level security', async () => {
    const { rows } = await owner.query(`select rolsuper, rolbypassrls, rolcreaterole, (select count(*)::int from pg_class where relowner = r.oid) as owned from pg_roles r where rolname = 'app_login'`);
    expect(rows[0]).toEqual({ rolsuper: false, rolbypassrls: false, rolcreaterole: false, owned: 0 });
  });

  test.each([
    ['edit the trail', `update audit_entry set act = 'x'`],
    ['empty the trail', 'truncate audit_entry'],
    ['delete from the trail', 'delete from audit_entry'],
    ['write to the trail by hand', `insert into audit_entry (actor_id, role, act, table_name, row_id, op) values (gen_random_uuid(), 'x', 'x', 'x', 'x', 'INSERT')`],
    ['switch a trigger off', 'alter table visit disable trigger all'],
    ['drop a policy', 'drop policy visit_reach on visit'],
    ['delete a record', 'delete from participant'],
    ['edit a seal', `update seal set root_hash = 'x'`],
  ])('may not %s', async (_what, statement) => {
    await expect(app.query(statement)).rejects.toMatchObject({ code: '42501' });
  });

  test('writes nothing without an act', async () => {
    await app.query('begin');
    await app.query(`select set_config('app.actor', gen_random_uuid()::text, true)`);
    const write = app.query(`insert into account (kind, label) values ('staff', 'X-01')`);
    await expect(write).rejects.toMatchObject({ code: '42501' });
    await app.query('rollback');
  });

  test('carries no setting into the next transaction', async () => {
    await app.query('begin');
    await app.query(`select set_config('app.actor', gen_random_uuid()::text, true), set_config('app.reach', gen_random_uuid()::text, true)`);
    await app.query('commit');
    const { rows } = await app.query('select app_actor() as actor, app_reach() as reach');
    expect(rows[0]).toEqual({ actor: null, reach: [] });
  });
});

test('the trail is closed to its owner as well', async () => {
  await owner.query('begin');
  await owner.query(`select set_config('app.actor', '00000000-0000-4000-8000-000000000001', true), set_config('app.act', 'test.write', true)`);
  await owner.query(`insert into account (kind, label) values ('staff', 'X-02')`);
  await expect(owner.query(`update audit_entry set act = 'other'`)).rejects.toMatchObject({ code: '42501' });
  await owner.query('rollback');
});

test('secrets do not enter the trail', async () => {
  await owner.query('begin');
  await owner.query(`select set_config('app.actor', '00000000-0000-4000-8000-000000000001', true), set_config('app.act', 'test.write', true)`);
  await owner.query(`insert into credential (account_id, email, password_hash) values ('00000000-0000-4000-8000-000000000001', 'x@tidemark.example', 'secret-hash')`);
  const { rows } = await owner.query(`select after::text as image, identity from audit_entry where table_name = 'credential' order by id desc limit 1`);
  await owner.query('rollback');
  expect(rows[0]?.image).not.toMatch(/secret-hash|x@tidemark/);
  expect(rows[0]?.identity).toBe(true);
});
