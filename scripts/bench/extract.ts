import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { ExtractSchema } from '@/entities/extract';
import type { Actor } from '@/lib/auth/roles';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { choosePeople } from '@/lib/extracts/choose-people';
import { extractFiles } from '@/lib/extracts/files';
import { bindPeople, statementOf } from '@/lib/extracts/read-file';
import { viewExtract } from '@/lib/extracts/view-extract';
import { extractPrepare } from '@/lib/jobs/handlers/extract-prepare';
import { log } from '@/lib/log';
import { storage } from '@/lib/storage';
import { readWork, withWork } from '@/lib/work/with-work';
import { actorOf } from './actors';
import { copyOut } from './copy-out';
import type { Bench } from './figures';
import { runPairs } from './pairs';
import { connect } from './statements';

const profile = 'controlled';

/** A row of the ledger without its job, which the served worker would take up beside us. */
const ask = (actor: Actor): Promise<string> =>
  withWork(actor, 'extract.request', async (work) => {
    const extract = work.em.create(ExtractSchema, {
      studyId: actor.studyId ?? '', profile, purpose: 'Bench', recipient: 'Bench', asOf: work.now, state: 'waiting', progress: 0, files: [], removed: [], counts: {},
      requestedBy: actor.accountId, requestedLabel: actor.label, requestedAt: work.now,
    });
    await work.em.flush();
    return extract.id;
  });

/** The statements of every data file with their people written in: `copy` takes no parameters. */
async function selects(system: Actor): Promise<string[]> {
  const { people } = await withWork(system, 'job.extract', choosePeople);
  const values = bindPeople(people).map((value) => pg.escapeLiteral(value));
  return extractFiles.map((file) => {
    let at = 0;
    return statementOf(file, profile).replace(/(?<!\\)\?/g, () => values[at++] ?? '').replaceAll('\\?', '?');
  });
}

/** Copies every file's rows in one transaction at one moment, and counts them. */
async function copyAll(client: pg.Client, system: Actor, statements: readonly string[]): Promise<number> {
  await client.query('begin isolation level repeatable read read only');
  await client.query(`select set_config('app.actor', $1, true), set_config('app.role', 'system', true), set_config('app.act', 'job.extract', true), set_config('app.reach', $2, true)`, [
    system.accountId, system.reach.join(','),
  ]);
  // As the service sets them: without, row security's estimates make the floor itself grow with the square of the participants.
  await client.query(`select set_config('enable_nestloop', 'off', true), set_config('jit', 'off', true)`);
  let rows = 0;
  for (const statement of statements) rows += (await copyOut(client, statement)).rows;
  await client.query('commit');
  return rows;
}

/** The whole job (read, clean, CSV, hash, keep, ledger) against `copy` of the same columns and rows, read and dropped. */
export async function benchExtract({ participants, pairs, tell }: Bench): Promise<void> {
  const dataManager = await actorOf('data-manager');
  const system = await systemEverywhere();
  const client = await connect('DATABASE_URL');
  const statements = await selects(system);
  const deps = { log: log(), storage: storage(), sendLetter: () => Promise.reject(new Error('An extract sends no letter.')), now: () => new Date() };
  const run = async (): Promise<string> => {
    const extractId = await ask(dataManager);
    await extractPrepare.run({ extractId }, { ...deps, jobId: randomUUID() });
    return extractId;
  };
  const first = await run();
  const copied = await copyAll(client, system, statements);
  const { files } = await readWork(dataManager, 'extract.view', (work) => viewExtract(work, { id: first }));
  const names = new Set(extractFiles.map(({ name }) => `${name}.csv`));
  const kept = files.filter(({ name }) => names.has(name)).reduce((sum, { rowCount }) => sum + rowCount, 0);
  if (kept !== copied) throw new Error(`The job kept ${kept} rows and copy gave ${copied}: the two are not the same work.`);
  const paired = await runPairs({
    // A whole extract of a large registry takes a minute: a few pairs tell enough.
    pairs: participants > 2000 ? Math.min(3, pairs) : Math.min(10, pairs),
    warmUps: 0,
    ours: run,
    floor: () => copyAll(client, system, statements),
  });
  tell({ kind: 'ratio', part: 'extract', participants, what: 'Extract, the whole job', detail: `${kept.toLocaleString('en-GB')} rows in ${names.size} files`, floor: 'copy (the same selects) to stdout, same login and settings', ...paired });
  await client.end();
}
