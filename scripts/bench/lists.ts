import { listParticipants } from '@/lib/participants/list-participants';
import { listParticipantsInput } from '@/lib/participants/input';
import { viewTodayInput } from '@/lib/today/input';
import { viewToday } from '@/lib/today/view-today';
import { readWork } from '@/lib/work/with-work';
import { actorOf } from './actors';
import type { Bench } from './figures';
import { runPairs } from './pairs';
import { SignedIn } from './signed-in';
import { connect, replay, statementsOf } from './statements';

const floor = 'the same statements by a bare client, same login and settings';
const warmUps = 5;

const questions = [
  { what: 'Participants, first page by code', query: '' },
  { what: 'Participants, first page by change', query: 'sort=change&direction=desc' },
  { what: 'Participants, swelling met, by next window', query: 'swelling=met&sort=nextCloses' },
  { what: 'Participants, code searched for', query: 'q=0042' },
] as const;

/** Participants over HTTP, for the monitor, who reaches every site, against the list's own statements. */
export async function benchLists({ participants, url, pairs, tell }: Bench): Promise<void> {
  const monitor = await SignedIn.as('monitor', url);
  const actor = await actorOf('monitor');
  const client = await connect('DATABASE_URL');
  for (const { what, query } of questions) {
    const input = listParticipantsInput.parse(Object.fromEntries(new URLSearchParams(query)));
    const statements = await statementsOf(() => readWork(actor, 'participant.list', (work) => listParticipants(work, input)));
    const paired = await runPairs({ pairs, warmUps, ours: () => monitor.ask('GET', `/api/participants?${query}`), floor: () => replay(client, statements) });
    tell({ kind: 'ratio', part: 'list', participants, what, floor, ...paired });
  }
  await client.end();
}

/** Today for one site's coordinator, as data and as the finished page, against its own statements. */
export async function benchToday({ participants, url, pairs, tell }: Bench): Promise<void> {
  const coordinator = await SignedIn.as('coordinator', url);
  const actor = await actorOf('coordinator');
  const client = await connect('DATABASE_URL');
  const statements = await statementsOf(() => readWork(actor, 'today.view', (work) => viewToday(work, viewTodayInput.parse({}))));
  const ways = [
    { what: 'Today, data (/api/today)', ours: () => coordinator.ask('GET', '/api/today') },
    { what: 'Today, page (/today, HTML)', ours: () => coordinator.load('/today') },
  ];
  for (const { what, ours } of ways) {
    const paired = await runPairs({ pairs, warmUps, ours, floor: () => replay(client, statements) });
    tell({ kind: 'ratio', part: 'today', participants, what, floor, ...paired });
  }
  await client.end();
}
