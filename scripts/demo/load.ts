import { hashPassword } from '@/lib/auth/password';
import type { Client } from 'pg';
import { type Change, type DemoEvent, finalRows, type Row } from './events';

/**
 * Replays events one transaction each, as their doers and at their time, with every trigger at work. The trail's clock
 * obeys only the owner of the tables (`app_now` in the migrations).
 */
const replay = `create procedure pg_temp.replay(events jsonb) language plpgsql as $$
declare
  event jsonb; change jsonb; columns text; settings text;
begin
  for event in select value from jsonb_array_elements(events) loop
    perform set_config('app.clock', event ->> 'at', true), set_config('app.actor', event ->> 'actor', true), set_config('app.role', event ->> 'role', true),
      set_config('app.act', event ->> 'act', true), set_config('app.reason', coalesce(event ->> 'reason', ''), true), set_config('app.identity', 'on', true);
    for change in select value from jsonb_array_elements(event -> 'changes') loop
      select string_agg(quote_ident(key), ', '), string_agg(format('%1$I = new_row.%1$I', key), ', ') into columns, settings from jsonb_object_keys(change -> 'rows' -> 0) key;
      if change ->> 'op' = 'insert' then
        execute format('insert into %1$I (%2$s) select %2$s from jsonb_populate_recordset(null::%1$I, $1)', change ->> 'table', columns) using change -> 'rows';
      else
        execute format('update %1$I set %2$s%3$s from jsonb_populate_recordset(null::%1$I, $1) new_row where %1$I.id = new_row.id', change ->> 'table', settings,
          case when exists (select from pg_attribute where attrelid = (change ->> 'table')::regclass and attname = 'version' and not attisdropped) then format(', version = %I.version + 1', change ->> 'table') else '' end)
        using change -> 'rows';
      end if;
    end loop;
    commit;
  end loop;
end $$`;

/** Hashes the passwords that the generator left plain. Equal passwords share one hash: hashing is slow on purpose. */
async function withHashes(events: readonly DemoEvent[]): Promise<DemoEvent[]> {
  const hashes = new Map<string, Promise<string>>();
  const hashOf = (password: string): Promise<string> => {
    const known = hashes.get(password) ?? hashPassword(password);
    hashes.set(password, known);
    return known;
  };
  const hashed = async (row: Row): Promise<Row> => {
    const plain = row['password_hash'];
    return typeof plain === 'string' && plain.startsWith('demo:') ? { ...row, password_hash: await hashOf(plain.slice('demo:'.length)) } : row;
  };
  const change = async (one: Change): Promise<Change> => (one.table === 'credential' ? { ...one, rows: await Promise.all(one.rows.map(hashed)) } : one);
  return Promise.all(events.map(async (event) => ({ ...event, changes: await Promise.all(event.changes.map(change)) })));
}

const batchSize = 400;

/** Loads events with the whole trail. They must be in order of time. */
export async function loadWithTrail(client: Client, events: readonly DemoEvent[]): Promise<void> {
  await client.query('set synchronous_commit = off');
  await client.query(replay);
  const ready = await withHashes(events);
  for (let start = 0; start < ready.length; start += batchSize) {
    await client.query('call pg_temp.replay($1::jsonb)', [JSON.stringify(ready.slice(start, start + batchSize))]);
  }
}

/** Tables in the order their foreign keys allow. */
const order = [
  'study', 'site', 'account', 'credential', 'protocol_version', 'consent_form_version', 'screening', 'participant', 'role_grant', 'participant_identity', 'eligibility_answer', 'consent', 'consent_signature',
  'visit', 'limb_assessment', 'limb_trial', 'questionnaire_response', 'training_session', 'training_set', 'training_flag', 'symptom_report', 'data_query', 'query_message', 'verification',
] as const;

/** Runs a load with the tables' own triggers off: no trail is written, which only a bench may want. */
export async function withoutTrail(client: Client, run: () => Promise<void>): Promise<void> {
  const each = async (verb: 'disable' | 'enable'): Promise<void> => {
    for (const table of order) await client.query(`alter table ${table} ${verb} trigger user`);
  };
  await client.query('set synchronous_commit = off');
  await each('disable');
  try {
    await run();
  } finally {
    await each('enable');
  }
  await client.query('analyze');
}

/** Loads what the rows have come to, in bulk. */
export async function loadFinalRows(client: Client, events: readonly DemoEvent[]): Promise<void> {
  const tables = finalRows(await withHashes(events));
  const stray = [...tables.keys()].filter((table) => !order.some((known) => known === table));
  if (stray.length > 0) throw new Error(`Say in scripts/demo/load.ts where ${stray.join(', ')} belongs in the order of loading.`);
  await client.query('begin');
  for (const table of order) {
    for (const [columns, rows] of byShape(tables.get(table) ?? [])) {
      await client.query(`insert into ${table} (${columns}) select ${columns} from json_populate_recordset(null::${table}, $1)`, [JSON.stringify(rows)]);
    }
  }
  await client.query('commit');
}

/** Rows with the same columns go in together: a column that is absent keeps its default. */
function byShape(rows: readonly Row[]): Map<string, Row[]> {
  const shapes = new Map<string, Row[]>();
  for (const row of rows) {
    const shape = Object.keys(row).toSorted().join(', ');
    const known = shapes.get(shape);
    if (known) known.push(row);
    else shapes.set(shape, [row]);
  }
  return shapes;
}
