import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { afterAll } from 'vitest';
import { participantCode } from '@/instruments/participant-code';
import { grantedRoles, nobody, inviteeAccountId, systemActor, type Actor, type GrantedRole } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import type { JobDeps } from '@/lib/jobs/define-job';
import { makeLog } from '@/lib/log';
import type { ConsentForm, ProtocolDocument } from '@/lib/protocol/document';
import { storage } from '@/lib/storage';
import { getOrm } from '@/lib/work/orm';
import { clock } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import { smallConsentForm, smallProtocol } from './given-protocol';

/**
 * The only builders of the data base tests. Each gives the least that is lawful and returns ids and actors;
 * what matters to a test is said in its arguments.
 */
afterAll(async () => {
  await (await getOrm()).close();
});

/** One statement as the owner of the tables, in its own transaction, with every site in reach. */
export async function asOwner<Row extends object>(text: string, values: readonly unknown[] = [], identity: 'on' | 'sign-in' = 'on'): Promise<Row[]> {
  const client = new Client({ connectionString: env().OWNER_DATABASE_URL });
  await client.connect();
  try {
    await client.query('begin');
    await client.query(
      `select set_config('app.actor', $1, true), set_config('app.act', 'demo.seed', true), set_config('app.role', 'system', true), set_config('app.identity', $2, true)`,
      [systemActor().accountId, identity],
    );
    await client.query(`select set_config('app.reach', coalesce((select string_agg(id::text, ',') from site), ''), true)`);
    const { rows } = await client.query<Row>(text, [...values]);
    await client.query('commit');
    return rows;
  } finally {
    await client.end();
  }
}

/** Everything in reach, as the seed works: for setting a scene, never for the act under test. */
export const setScene = <T>(siteIds: readonly string[], run: (work: Work) => Promise<T>, now?: Date): Promise<T> =>
  withWork(systemActor(siteIds), 'demo.seed', run, now ? { now } : {});

export const only = <T>(rows: readonly T[]): T => {
  const [row] = rows;
  if (row === undefined) throw new Error('Expected one row.');
  return row;
};

/** What a job's handler may touch, with the mail and the clock in the test's hands. */
export const jobDeps = (sendLetter: JobDeps['sendLetter'], now?: Date): JobDeps => ({
  log: makeLog('silent'),
  storage: storage(),
  sendLetter,
  now: () => now ?? clock(),
  jobId: randomUUID(),
});

let made = 0;
const next = (): number => (made += 1);

export interface GivenStudy {
  readonly id: string;
}

/** A study that runs from 2026 to 2029. */
export async function givenStudy(): Promise<GivenStudy> {
  return only(
    await asOwner<GivenStudy>(`insert into study (name, starts_on, ends_on, recruitment_target) values ($1, '2026-01-01', '2029-12-31', 150) returning id`, [
      `Steady Lift ${next()}`,
    ]),
  );
}

export interface GivenSite {
  readonly id: string;
  readonly studyId: string;
  readonly code: string;
  readonly name: string;
}

/** A site with a free two-letter prefix. */
export async function givenSite(study: GivenStudy, about: { code?: string; name?: string; timeZone?: string } = {}): Promise<GivenSite> {
  const count = next();
  const code = about.code ?? `${String.fromCharCode(65 + Math.floor(count / 26))}${String.fromCharCode(65 + (count % 26))}`;
  const name = about.name ?? `Site ${code}`;
  const { id } = only(
    await asOwner<{ id: string }>(
      `insert into site (study_id, code, name, time_zone, phone, email, recruitment_target) values ($1, $2, $3, $4, '+44 1632 960100', $5, 50) returning id`,
      [study.id, code, name, about.timeZone ?? 'Europe/London', `${code.toLowerCase()}@tidemark.example`],
    ),
  );
  return { id, studyId: study.id, code, name };
}

export interface GivenProtocol {
  readonly id: string;
  readonly consentFormId: string;
  readonly document: ProtocolDocument;
}

/** Protocol version 1 and consent form 1.0, in effect since the study began. Changes are merged over the small ones. */
export async function givenProtocol(study: GivenStudy, change: Partial<ProtocolDocument> = {}, form: ConsentForm = smallConsentForm): Promise<GivenProtocol> {
  const document = { ...smallProtocol, ...change };
  return setScene([], async (work) => {
    const protocol = only(
      await work.sql<{ id: string }>(
        `insert into protocol_version (study_id, number, document, reason, effective_on) values (?, '1.0', ?::jsonb, 'First version', '2026-01-01') returning id`,
        [study.id, JSON.stringify(document)],
      ),
    );
    const consent = only(
      await work.sql<{ id: string }>(`insert into consent_form_version (study_id, number, document, effective_on) values (?, '1.0', ?::jsonb, '2026-01-01') returning id`, [
        study.id,
        JSON.stringify(form),
      ]),
    );
    return { id: protocol.id, consentFormId: consent.id, document };
  });
}

/** Roles whose reach is the whole study. */
const studyWide: readonly GrantedRole[] = ['investigator', 'data-manager', 'administrator', 'auditor'];

/** The name that an account of `givenStaff` signs with. */
export const staffName = ({ label }: { label: string }): string => `Robin Example ${label}`;

/** Somebody with one role: at the given sites, or over the whole study for the roles that work so. */
export async function givenStaff(role: Exclude<GrantedRole, 'participant'>, sites: GivenSite | readonly GivenSite[], label?: string): Promise<Actor> {
  const list: readonly GivenSite[] = 'id' in sites ? [sites] : sites;
  const [first] = list;
  if (!first || !grantedRoles.includes(role)) throw new Error('Somebody needs a role and a site.');
  const whole = studyWide.includes(role);
  const by = label ?? `${role.charAt(0).toUpperCase()}-${String(next()).padStart(2, '0')}`;
  const accountId = await setScene([], async (work) => {
    const account = only(await work.sql<{ id: string }>(`insert into account (kind, label, name, state) values ('staff', ?, ?, 'active') returning id`, [by, staffName({ label: by })]));
    await work.sql(
      `insert into role_grant (account_id, study_id, role, label, whole_study, site_ids, starts_at) values (?, ?, ?, ?, ?, ?::uuid[], '2026-01-01')`,
      [account.id, first.studyId, role, by, whole, whole ? '{}' : `{${list.map(({ id }) => id).join(',')}}`],
    );
    return account.id;
  });
  return { accountId, role, label: by, studyId: first.studyId, reach: list.map(({ id }) => id), participantId: null, screeningId: null };
}

export interface GivenScreening {
  readonly id: string;
  readonly siteId: string;
  readonly email: string;
  readonly name: string;
  /** The holder of this screening's consent link. */
  readonly invitee: Actor;
  /** Whoever holds the tablet that was handed over for this screening. */
  readonly atTablet: Actor;
}

/** Somebody being screened, with identity; eligibility answered and confirmed when a confirmer is given. */
export async function givenScreening(
  site: GivenSite,
  protocol: GivenProtocol,
  about: { cohort?: string; screenedOn?: string; name?: string; email?: string; bornOn?: string; confirmedBy?: Actor } = {},
): Promise<GivenScreening> {
  const count = next();
  const name = about.name ?? `Ada Example ${count}`;
  const email = about.email ?? `person-${count}@home.example`;
  const id = await setScene([site.id], async (work) => {
    const counter = only(await work.sql<{ n: number }>('update site set screening_count = screening_count + 1 where id = ? returning screening_count as n', [site.id]));
    const screening = only(
      await work.sql<{ id: string }>(
        'insert into screening (site_id, number, screened_on, cohort, protocol_version_id, eligibility_confirmed_at, eligibility_confirmed_by) values (?, ?, ?, ?, ?, ?, ?) returning id',
        [
          site.id,
          counter.n,
          about.screenedOn ?? '2027-01-05',
          about.cohort ?? 'at-risk',
          protocol.id,
          about.confirmedBy ? '2027-01-05T10:00:00Z' : null,
          about.confirmedBy?.accountId ?? null,
        ],
      ),
    );
    await work.sql('insert into participant_identity (screening_id, site_id, name, email, phone, born_on) values (?, ?, ?, ?, ?, ?)', [
      screening.id,
      site.id,
      name,
      email,
      '+44 1632 960101',
      about.bornOn ?? '1968-04-12',
    ]);
    if (about.confirmedBy)
      for (const { key, lets } of protocol.document.eligibility)
        await work.sql('insert into eligibility_answer (screening_id, site_id, criterion, answer) values (?, ?, ?, ?)', [screening.id, site.id, key, lets]);
    return screening.id;
  });
  const invitee: Actor = { accountId: inviteeAccountId, role: 'invitee', label: 'invited person', studyId: null, reach: [site.id], participantId: nobody, screeningId: id };
  return { id, siteId: site.id, email, name, invitee, atTablet: { ...invitee, label: 'at the tablet', atTablet: true } };
}

/** A consent in the given state, on the protocol's form, with the signatures that state needs. */
export async function givenConsent(
  screening: GivenScreening,
  protocol: GivenProtocol,
  staff: Actor,
  state: 'reading' | 'signed by participant' | 'complete' = 'complete',
  permissions: Record<string, 'yes' | 'no'> = { 'data-sharing': 'yes', 'future-contact': 'no' },
): Promise<{ id: string }> {
  const signed = state !== 'reading';
  const complete = state === 'complete';
  return setScene([screening.siteId], async (work) => {
    const consent = only(
      await work.sql<{ id: string }>(
        `insert into consent (screening_id, site_id, form_version_id, mode, state, sections_read, permissions, participant_signed_at, staff_signed_at, staff_signed_by)
         values (?, ?, ?, 'tablet', ?, ?::text[], ?::jsonb, ?, ?, ?) returning id`,
        [
          screening.id,
          screening.siteId,
          protocol.consentFormId,
          state,
          signed ? '{key-facts,what-we-ask}' : '{}',
          signed ? JSON.stringify(permissions) : '{}',
          signed ? '2027-01-05T11:00:00Z' : null,
          complete ? '2027-01-05T11:10:00Z' : null,
          complete ? staff.accountId : null,
        ],
      ),
    );
    for (const [who, name, needed] of [
      ['participant', screening.name, signed],
      ['staff', staffName(staff), complete],
    ] as const)
      if (needed)
        await work.sql(
          `insert into consent_signature (consent_id, screening_id, site_id, who, means, name, account_id, signed_at, content_sha256) values (?, ?, ?, ?, 'typed', ?, ?, '2027-01-05T11:00:00Z', ?)`,
          [consent.id, screening.id, screening.siteId, who, name, who === 'staff' ? staff.accountId : null, '0'.repeat(64)],
        );
    return consent;
  });
}

export interface GivenParticipant {
  readonly id: string;
  readonly code: string;
  readonly siteId: string;
  readonly screeningId: string;
  /** The participant, signed in. */
  readonly actor: Actor;
  /** Visit ids by the protocol's keys. */
  readonly visits: Readonly<Record<string, string>>;
}

/** Somebody enrolled on a day, with account, role and schedule; nothing recorded yet. */
export async function givenParticipant(
  site: GivenSite,
  protocol: GivenProtocol,
  staff: Actor,
  about: { enrolledOn?: string; cohort?: string; affectedSide?: 'left' | 'right'; permissions?: Record<string, 'yes' | 'no'>; email?: string } = {},
): Promise<GivenParticipant> {
  const enrolledOn = about.enrolledOn ?? '2027-01-06';
  const screening = await givenScreening(site, protocol, {
    confirmedBy: staff,
    ...(about.cohort ? { cohort: about.cohort } : {}),
    ...(about.email ? { email: about.email } : {}),
  });
  await givenConsent(screening, protocol, staff, 'complete', about.permissions);
  return setScene([site.id], async (work) => {
    const { n } = only(await work.sql<{ n: number }>('update site set participant_count = participant_count + 1 where id = ? returning participant_count as n', [site.id]));
    const code = participantCode(site.code, n);
    await work.sql('set constraints all deferred');
    const { id } = only(await work.sql<{ id: string }>('select gen_random_uuid() as id'));
    for (const table of ['consent', 'eligibility_answer', 'participant_identity'])
      await work.sql(`update ${table} set participant_id = ? where screening_id = ?`, [id, screening.id]);
    await work.sql(`update screening set participant_id = ?, state = 'enrolled' where id = ?`, [id, screening.id]);
    await work.sql(
      `insert into participant (id, site_id, code, number, cohort, affected_side, dominant_side, age_years, height_mm, surgery_on, surgery, axillary_procedure, nodes_removed, radiotherapy, systemic_therapy, enrolled_on, anchor_on, protocol_version_id)
       values (?, ?, ?, ?, ?, ?, 'right', 58, 1650, '2026-09-01', 'breast-conserving', 'sentinel-node-biopsy', 3, 'breast-or-chest-wall', 'none', ?, ?, ?)`,
      [id, site.id, code, n, about.cohort ?? 'at-risk', about.affectedSide ?? 'left', enrolledOn, enrolledOn, protocol.id],
    );
    const visits: Record<string, string> = {};
    for (const visit of protocol.document.visits) {
      const row = only(
        await work.sql<{ id: string }>(
          `insert into visit (site_id, participant_id, key, name, target_on, opens_on, closes_on, protocol_version_id)
           values (?, ?, ?, ?, ?::date + ?::int, ?::date + ?::int, ?::date + ?::int, ?) returning id`,
          [
            site.id, id, visit.key, visit.name,
            enrolledOn, visit.offsetDays,
            enrolledOn, visit.offsetDays - visit.earlyDays,
            enrolledOn, visit.offsetDays + visit.lateDays,
            protocol.id,
          ],
        ),
      );
      visits[visit.key] = row.id;
      for (const instrument of visit.questionnaires)
        await work.sql(
          `insert into questionnaire_response (site_id, participant_id, visit_id, instrument, instrument_version, due_on, opens_on, closes_on)
           select site_id, participant_id, id, ?, 1, target_on, opens_on, closes_on from visit where id = ?`,
          [instrument, row.id],
        );
    }
    const account = only(await work.sql<{ id: string }>(`insert into account (kind, label, state) values ('participant', ?, 'active') returning id`, [code]));
    await work.sql(
      `insert into role_grant (account_id, study_id, role, label, site_ids, of_participant_id, starts_at) values (?, ?, 'participant', ?, ?::uuid[], ?, '2026-01-01')`,
      [account.id, site.studyId, code, `{${site.id}}`, id],
    );
    const actor: Actor = { accountId: account.id, role: 'participant', label: code, studyId: site.studyId, reach: [site.id], participantId: id, screeningId: null };
    return { id, code, siteId: site.id, screeningId: screening.id, actor, visits };
  });
}

export interface GivenScene {
  readonly study: GivenStudy;
  readonly site: GivenSite;
  readonly otherSite: GivenSite;
  readonly protocol: GivenProtocol;
  /** The coordinator of `site`. */
  readonly coordinator: Actor;
  /** The coordinator of `otherSite`. */
  readonly otherCoordinator: Actor;
}

/** One study with two sites, a protocol and a coordinator at each: where most tests begin. */
export async function givenScene(change: Partial<ProtocolDocument> = {}): Promise<GivenScene> {
  const study = await givenStudy();
  const site = await givenSite(study);
  const otherSite = await givenSite(study);
  const protocol = await givenProtocol(study, change);
  return {
    study,
    site,
    otherSite,
    protocol,
    coordinator: await givenStaff('site-coordinator', site),
    otherCoordinator: await givenStaff('site-coordinator', otherSite),
  };
}
