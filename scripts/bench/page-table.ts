import type { Client } from 'pg';

/** A page's address below app, without its groups, who opens it in the bench, and how its parts in brackets are filled. */
export interface BenchPage {
  readonly route: string;
  /** A key of scripts/demo-accounts.mjs; null: nobody is signed in. */
  readonly account: string | null;
  /** SQL that returns the parts in brackets as columns of their names, for one row; $1 is the account's address. */
  readonly fill?: string;
}

const atSite = `from role_grant g join credential c on c.account_id = g.account_id and c.email = $1 join participant p on p.site_id = any (g.site_ids)`;
const own = `from role_grant g join credential c on c.account_id = g.account_id and c.email = $1 join participant p on p.id = g.of_participant_id`;

/** Every page of the application that a person opens. A page that is missing here is told as not measured. */
export const benchPages: readonly BenchPage[] = [
  { route: '/sign-in', account: null },
  { route: '/welcome', account: null },
  { route: '/api-docs', account: null },
  { route: '/mailbox', account: null },
  { route: '/today', account: 'coordinator' },
  { route: '/participants', account: 'coordinator' },
  { route: '/participants/[code]', account: 'coordinator', fill: `select p.code ${atSite} order by p.code limit 1` },
  {
    route: '/participants/[code]/visits/[visitId]',
    account: 'coordinator',
    fill: `select p.code, v.id as "visitId" ${atSite} join visit v on v.participant_id = p.id and v.state = 'complete' order by p.code, v.target_on limit 1`,
  },
  {
    route: '/participants/[code]/visits/[visitId]/limb',
    account: 'assessor',
    fill: `select p.code, v.id as "visitId" ${atSite} join visit v on v.participant_id = p.id and v.state = 'to come' where p.state = 'enrolled' order by p.code, v.target_on limit 1`,
  },
  { route: '/screening', account: 'coordinator' },
  { route: '/screening/new', account: 'coordinator' },
  { route: '/screening/[id]', account: 'coordinator', fill: `select k.id ${atSite} join screening k on k.participant_id = p.id order by p.code limit 1` },
  {
    route: '/screening/[id]/consent',
    account: 'coordinator',
    fill: `select k.id ${atSite} join screening k on k.site_id = p.site_id join consent n on n.screening_id = k.id and n.state = 'reading' order by k.id limit 1`,
  },
  { route: '/queries', account: 'monitor' },
  { route: '/safety', account: 'coordinator' },
  { route: '/safety/[id]', account: 'coordinator', fill: `select r.id ${atSite} join symptom_report r on r.participant_id = p.id order by r.reported_at desc limit 1` },
  { route: '/results', account: 'investigator' },
  { route: '/extracts', account: 'data-manager' },
  { route: '/extracts/[id]', account: 'data-manager', fill: 'select id from extract where $1::text is not null order by requested_at desc limit 1' },
  { route: '/extracts/new', account: 'data-manager' },
  { route: '/audit', account: 'data-manager' },
  { route: '/protocol', account: 'data-manager' },
  { route: '/people', account: 'administrator' },
  { route: '/week', account: 'participant-one' },
  { route: '/log', account: 'participant-one' },
  { route: '/questions', account: 'participant-one' },
  {
    route: '/questions/[id]',
    account: 'participant-one',
    fill: `select q.id ${own} join questionnaire_response q on q.participant_id = p.id
      where q.state in ('due', 'in progress') and current_date between q.opens_on and q.closes_on order by q.due_on limit 1`,
  },
  { route: '/report', account: 'participant-one' },
  { route: '/my-arm', account: 'participant-one' },
  { route: '/my-lifting', account: 'participant-one' },
  { route: '/my-consent', account: 'participant-one' },
];

/** Pages that need a letter's secret link or a tablet handed over, or show components only: not opened by the bench. */
export const leftOut: readonly string[] = ['/', '/gallery', '/gallery/staff', '/gallery/phone', '/hand-back', '/join/[token]', '/consent/[token]'];

/** The address of a page with its parts filled in; null when the data base holds nothing to show there. */
export async function addressOf({ route, fill }: BenchPage, email: string | null, owner: Client): Promise<string | null> {
  if (!fill) return route;
  const { rows } = await owner.query<Record<string, string>>(fill, [email]);
  const [found] = rows;
  return found ? route.replace(/\[(\w+)\]/g, (_, part: string) => encodeURIComponent(found[part] ?? '')) : null;
}
