import { randomUUID } from 'node:crypto';
import type { Client } from 'pg';
import type { Actor } from '@/lib/auth/roles';
import { actorOf } from './actors';
import type { Bench } from './figures';
import { runPairs } from './pairs';
import { makeTwins, readSaved, saveBare, type SavedRows } from './save-bare';
import { SignedIn } from './signed-in';
import { connect } from './statements';

interface OpenSitting {
  readonly id: string;
  readonly version: number;
  readonly map: { readonly levelCount: number };
}

const passes = [
  { side: 'left', trial: 1, firstMm: 160 },
  { side: 'right', trial: 1, firstMm: 163 },
  { side: 'left', trial: 2, firstMm: 161 },
  { side: 'right', trial: 2, firstMm: 162 },
] as const;

/** An arm that widens evenly, so that no check has anything to say. */
const girthsMm = (firstMm: number, levelCount: number): number[] => Array.from({ length: levelCount }, (_, level) => firstMm + level * 12);

/** One sitting as the screen sends it: opened, circumstances, four passes of the tape, saved as complete. Seven requests. */
async function saveThroughApi(assessor: SignedIn, visitId: string): Promise<void> {
  const opened = await assessor.ask<OpenSitting>('POST', `/api/visits/${visitId}/assessment`, { body: {}, headers: { 'idempotency-key': randomUUID() } });
  const { id, map } = opened.body;
  let { version } = opened.body;
  const change = async <T extends { version: number }>(method: string, path: string, body: unknown): Promise<T> => {
    const answer = await assessor.ask<T>(method, `/api/assessments/${id}/${path}`, { body, headers: { 'if-match': `"v${version}"` } });
    version = answer.body.version;
    return answer.body;
  };
  await change('PUT', 'circumstances', {
    position: 'supported, 90° forward', sleeveWorn: false, hoursSinceTraining: 48, bodyWeightG: 68_000, impedanceRatio: 1.02, impedanceRestMin: 10, remarks: null,
  });
  for (const { side, trial, firstMm } of passes) await change('PUT', `trials/${side}/${trial}`, { circumferencesMm: girthsMm(firstMm, map.levelCount) });
  const { findings } = await change<{ version: number; findings: unknown[] }>('POST', 'complete', { kept: [] });
  if (findings.length > 0) throw new Error(`The bench's arm raises findings, so the floor would not write the same rows: ${JSON.stringify(findings)}`);
}

/** Visits to come at the assessor's site, of participants with a baseline; different participants first. */
async function visitsToCome(owner: Client, { reach }: Actor, wanted: number): Promise<string[]> {
  const { rows } = await owner.query<{ id: string }>(
    `select id from (
       select v.id, v.participant_id, row_number() over (partition by v.participant_id order by v.target_on) as place
       from visit v join participant p on p.id = v.participant_id
       where v.site_id = any ($1::uuid[]) and v.state = 'to come' and p.state = 'enrolled' and v.key <> 'baseline'
         and exists (select from limb_assessment a join visit b on b.id = a.visit_id where a.participant_id = p.id and a.state = 'complete' and b.key = 'baseline')
     ) each_visit order by place, participant_id limit $2`,
    [reach, wanted],
  );
  return rows.map(({ id }) => id);
}

const warmUps = 4;
const floors = [
  { where: 'twins', floor: 'one transaction of three statements, no triggers, no trail' },
  { where: 'record', floor: 'the same transaction on the real tables, with row security and trail' },
] as const;

/** A whole limb assessment through the API against bare SQL that writes the same rows. */
export async function benchSave({ participants, url, pairs, tell }: Bench): Promise<void> {
  const assessor = await SignedIn.as('assessor', url);
  const actor = await actorOf('assessor');
  const owner = await connect('OWNER_DATABASE_URL');
  const login = await connect('DATABASE_URL');
  const each = warmUps + pairs;
  const visits = await visitsToCome(owner, actor, 1 + floors.length * 2 * each);
  const [example, ...free] = visits;
  const most = Math.floor(free.length / (floors.length * 2)) - warmUps;
  if (!example || most < 3) return tell({ kind: 'not run', part: 'save', participants, what: 'Saving a limb assessment', why: `only ${visits.length} visits to come at the assessor's site` });
  await saveThroughApi(assessor, example);
  const saved: SavedRows = await readSaved(owner, example);
  await makeTwins(owner);
  const next = (): string => free.shift() as string;
  for (const { where, floor } of floors) {
    const client = where === 'twins' ? owner : login;
    const paired = await runPairs({
      pairs: Math.min(pairs, most),
      warmUps,
      ours: () => saveThroughApi(assessor, next()),
      floor: () => saveBare(client, { saved, visitId: next(), where, actor }),
    });
    tell({ kind: 'ratio', part: 'save', participants, what: 'Saving a limb assessment', detail: `seven requests, ${(paired.oursMs / 7).toFixed(1)} ms each`, floor, ...paired });
  }
  await owner.query('drop schema bench cascade');
  await owner.end();
  await login.end();
}
