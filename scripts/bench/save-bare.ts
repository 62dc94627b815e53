import { randomUUID } from 'node:crypto';
import type { Client } from 'pg';
import type { Actor } from '@/lib/auth/roles';

type Row = Record<string, unknown>;

/** The rows that one saved assessment came to, as the data base writes them in JSON. */
export interface SavedRows {
  readonly assessment: Row;
  readonly trials: readonly Row[];
}

/** Reads back what the API wrote for a visit. */
export async function readSaved(owner: Client, visitId: string): Promise<SavedRows> {
  const assessments = await owner.query<{ row: Row }>('select to_jsonb(a) as row from limb_assessment a where a.visit_id = $1', [visitId]);
  const assessment = assessments.rows[0]?.row;
  if (!assessment) throw new Error('The assessment saved through the API is not in the data base.');
  const trials = await owner.query<{ row: Row }>('select to_jsonb(t) as row from limb_trial t where t.assessment_id = $1', [assessment['id']]);
  return { assessment, trials: trials.rows.map(({ row }) => row) };
}

/**
 * Copies of the three tables with the same rows, indexes, checks and foreign keys, and without triggers, row security
 * and trail: the least that the data base must do to keep an assessment.
 */
export async function makeTwins(owner: Client): Promise<void> {
  await owner.query('drop schema if exists bench cascade');
  await owner.query('create schema bench');
  for (const table of ['visit', 'limb_assessment', 'limb_trial']) {
    await owner.query(`create table bench.${table} (like public.${table} including all)`);
    await owner.query(`insert into bench.${table} select * from public.${table}`);
    const { rows } = await owner.query<{ conname: string; definition: string }>(
      `select conname, pg_get_constraintdef(oid) as definition from pg_constraint where conrelid = $1::regclass and contype = 'f'`,
      [`public.${table}`],
    );
    for (const { conname, definition } of rows) {
      const own = definition.replace(/references (visit|limb_assessment)\(/i, 'references bench.$1(');
      await owner.query(`alter table bench.${table} add constraint ${conname} ${own}`);
    }
    await owner.query(`analyze bench.${table}`);
  }
}

const insert = (table: string): string => `insert into ${table} select * from jsonb_populate_recordset(null::${table}, $1::jsonb)`;

/**
 * Writes an assessment's rows for another visit in one transaction: insert the assessment, insert its four trials,
 * complete the visit. On the real tables it carries the settings that row security and trail ask for.
 */
export async function saveBare(client: Client, { saved, visitId, where, actor }: { saved: SavedRows; visitId: string; where: 'twins' | 'record'; actor: Actor }): Promise<void> {
  const schema = where === 'twins' ? 'bench' : 'public';
  const id = randomUUID();
  await client.query('begin');
  if (where === 'record')
    await client.query(`select set_config('app.actor', $1, true), set_config('app.role', $2, true), set_config('app.act', 'assessment.complete', true), set_config('app.reach', $3, true)`, [
      actor.accountId, actor.role, actor.reach.join(','),
    ]);
  const { rows } = await client.query<{ participant_id: string }>(
    `update ${schema}.visit set state = 'complete', done_on = target_on, version = version + 1 where id = $1 returning participant_id`,
    [visitId],
  );
  const participant = { participant_id: rows[0]?.participant_id };
  await client.query(insert(`${schema}.limb_assessment`), [JSON.stringify([{ ...saved.assessment, ...participant, id, visit_id: visitId }])]);
  await client.query(insert(`${schema}.limb_trial`), [JSON.stringify(saved.trials.map((trial) => ({ ...trial, ...participant, id: randomUUID(), assessment_id: id })))]);
  await client.query('commit');
}
