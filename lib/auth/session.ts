import type { Actor, GrantedRole } from './roles';
import { inviteeAccountId, nobody, systemActor } from './roles';
import { tokenHash } from './token';
import { Refusal } from '@/lib/work/refusal';
import { moment, secondsAfter } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';

/** Idle limit: half an hour for staff, an hour for participants. Drafts are kept on the server. */
const idleSeconds = { staff: 1800, participant: 3600, system: 0 } as const;

/** A role a person holds, as the role menu shows it. */
export interface GrantView {
  readonly id: string;
  readonly role: GrantedRole;
  readonly label: string;
  readonly siteNames: readonly string[];
  readonly wholeStudy: boolean;
}

/** A live session: who acts, and which other roles the person may choose. */
export interface LiveSession {
  readonly actor: Actor;
  readonly grantId: string;
  readonly grants: readonly GrantView[];
  readonly studyName: string;
  readonly siteNames: readonly string[];
}

export interface SessionRow {
  id: string;
  account_id: string;
  kind: 'staff' | 'participant' | 'system';
  role_grant_id: string | null;
  seen_at: string;
  handed_over_screening_id: string | null;
  handed_over_site_id: string | null;
}

interface GrantRow {
  id: string;
  role: GrantedRole;
  label: string;
  study_id: string;
  study_name: string;
  whole_study: boolean;
  site_ids: string[];
  site_names: string[];
  of_participant_id: string | null;
}

/** The person who holds the tablet now: one screening in reach, and no role of the one who signed in. */
function handedOver({ handed_over_screening_id: screeningId, handed_over_site_id: siteId }: SessionRow): Actor | null {
  if (screeningId === null || siteId === null) return null;
  return { accountId: inviteeAccountId, role: 'invitee', label: 'at the tablet', studyId: null, reach: [siteId], participantId: nobody, screeningId, atTablet: true };
}

const grantsOf = (work: Work, accountId: string): Promise<GrantRow[]> =>
  work.sql<GrantRow>(
    `select g.id, g.role, g.label, g.study_id, st.name as study_name, g.whole_study, g.of_participant_id,
       array_agg(s.id::text order by s.name) as site_ids, array_agg(s.name order by s.name) as site_names
     from role_grant g join study st on st.id = g.study_id
     join site s on s.study_id = g.study_id and (g.whole_study or s.id = any (g.site_ids))
     where g.account_id = ? and g.starts_at <= ? and (g.ends_at is null or g.ends_at > ?)
     group by g.id, st.name order by g.role, g.label`,
    [accountId, work.now, work.now],
  );

export async function liveRow(work: Work, token: string): Promise<SessionRow | null> {
  const [row] = await work.sql<SessionRow>(
    `select s.id, s.account_id, a.kind, s.role_grant_id, s.seen_at, s.handed_over_screening_id, s.handed_over_site_id from app_session s join account a on a.id = s.account_id
     where s.token_hash = ? and s.ended_at is null and s.expires_at > ? and a.state = 'active'`,
    [tokenHash(token), work.now],
  );
  if (!row) return null;
  const seenAt = moment(row.seen_at);
  if (secondsAfter(seenAt, idleSeconds[row.kind]) < work.now) return null;
  if (secondsAfter(seenAt, 60) < work.now) await work.sql('update app_session set seen_at = ? where id = ?', [work.now, row.id]);
  return row;
}

/** Who stands behind a session token, read fresh: an ended session, account or role counts at the next request. */
export async function liveSession(token: string): Promise<LiveSession | null> {
  return withWork(systemActor(), 'session.check', async (work) => {
    const row = await liveRow(work, token);
    if (!row) return null;
    const grants = await grantsOf(work, row.account_id);
    // A chosen role that has ended takes the session along: nobody goes on in another role without having chosen it.
    const grant = row.role_grant_id === null ? grants[0] : grants.find(({ id }) => id === row.role_grant_id);
    if (!grant) return null;
    return {
      actor: handedOver(row) ?? {
        accountId: row.account_id,
        role: grant.role,
        label: grant.label,
        studyId: grant.study_id,
        reach: grant.site_ids,
        participantId: grant.of_participant_id,
        screeningId: null,
      },
      grantId: grant.id,
      grants: grants.map((each) => ({ id: each.id, role: each.role, label: each.label, siteNames: each.site_names, wholeStudy: each.whole_study })),
      studyName: grant.study_name,
      siteNames: grant.site_names,
    };
  });
}

/** Takes up another of the person's own roles. @throws Refusal 'forbidden' while the tablet is with a participant: it is taken back first. */
export async function chooseRole(token: string, grantId: string): Promise<void> {
  await withWork(systemActor(), 'session.choose-role', async (work) => {
    const row = await liveRow(work, token);
    if (row?.handed_over_screening_id) throw new Refusal('forbidden', 'This tablet is handed over. Take it back first.');
    const grant = row && (await grantsOf(work, row.account_id)).find(({ id }) => id === grantId);
    if (!row || !grant) throw new Refusal('not-found', 'You do not hold that role now.');
    await work.sql('update app_session set role_grant_id = ? where id = ?', [grantId, row.id]);
    await work.event('role', row.account_id, { role: grant.role, label: grant.label });
  });
}
