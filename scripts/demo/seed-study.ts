import { setImmediate as nextTurn } from 'node:timers/promises';
import type { Client } from 'pg';
import { inOrder, type DemoEvent } from './events';
import { askForCopies } from './copies';
import { people, studyEvents } from './generate';
import { loadFinalRows, loadWithTrail, withoutTrail } from './load';
import { layOut, type Plan } from './plan';

export interface SeedOptions {
  readonly participants: number;
  /** Without the audit trail, and with short training logs: for the bench. */
  readonly light: boolean;
  readonly now: Date;
  readonly seed: number;
}

export const demoDefaults = { participants: 150, seed: 20 } as const;

/** Weeks of training a light load keeps for each participant. */
const lightLogWeeks = 3;
/** People in one bulk load. */
const crowd = 400;

/** What stands in the data base: nothing, all of an earlier seed, or a part of one that broke off. */
export async function stateOf(client: Client): Promise<'empty' | 'seeded' | 'broken off'> {
  const { rows } = await client.query<{ studies: number; seeded: number }>(
    `select (select count(*)::int from study) as studies, (select count(*)::int from audit_entry where act = 'demo.seed' and op = 'EVENT' and after ->> 'seeded' = 'whole') as seeded`,
  );
  const [counts] = rows;
  if (!counts || counts.studies === 0) return 'empty';
  return counts.seeded > 0 ? 'seeded' : 'broken off';
}

/** Fills an empty data base with the invented study. The last thing written says that the whole is there. */
export async function seedStudy(client: Client, options: SeedOptions): Promise<Plan> {
  const plan = layOut({ ...options, ...(options.light ? { logWeeks: lightLogWeeks, marksTape: false } : { logWeeks: 200, marksTape: true }) });
  if (options.light) await loadLight(client, plan);
  else await loadWithTrail(client, inOrder([...studyEvents(plan), ...[...people(plan)].flatMap(({ events }) => events)]));
  await client.query(`select set_config('app.actor', '00000000-0000-4000-8000-000000000001', false), set_config('app.act', 'demo.seed', false), set_config('app.role', 'system', false)`);
  await client.query(`select audit_event('study', $1, $2::jsonb, null, null)`, [plan.ids.study, JSON.stringify({ seeded: 'whole', participants: options.participants, trail: !options.light })]);
  if (!options.light) await askForCopies(client);
  await client.query('analyze');
  return plan;
}

async function loadLight(client: Client, plan: Plan): Promise<void> {
  await withoutTrail(client, async () => {
    await loadFinalRows(client, studyEvents(plan));
    let waiting: DemoEvent[] = [];
    let loading = Promise.resolve();
    let heads = 0;
    for (const { events } of people(plan)) {
      waiting.push(...events);
      heads += 1;
      // Gives way to the load under way: the data base works on one crowd while the next is invented.
      await nextTurn();
      if (heads % crowd !== 0) continue;
      await loading;
      loading = loadFinalRows(client, waiting);
      // Its failure is met at the next await; until then it must not count as unhandled.
      loading.catch(() => undefined);
      waiting = [];
    }
    await loading;
    await loadFinalRows(client, waiting);
  });
}
