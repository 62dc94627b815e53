/**
 * The sentences every table needs, in one place: row-level security switched on
 * and forced, grants, policy, audit watch. A table made without them fails tests/db/guards.
 */

/** Who may see a row. Policies name no roles: they ask only what the transaction may reach. */
export type Reach =
  /** Rows of the sites in reach; a participant sees only the own record. Needs site_id, participant_id. */
  | 'record'
  /** As 'record', and only while identity data is asked for by an act that may. */
  | 'identity'
  /** Before enrolment: sites in reach; an invited person sees only the own screening. Needs site_id, screening_id. */
  | 'screening'
  /** As 'screening', for identity data. */
  | 'screening-identity'
  /** Anyone whose actor is known. */
  | 'known'
  /** Staff, and each account for itself. Needs account_id. */
  | 'account'
  /** Only while signing somebody in, or changing how they sign in. */
  | 'sign-in';

const own = `((select app_participant()) is null or participant_id = (select app_participant()))`;
// The holder of a consent link reaches one screening; a participant only what hangs on the own record.
const ownScreening = `case when (select app_screening()) is not null then screening_id = (select app_screening()) else ${own} end`;
const inReach = `site_id = any ((select app_reach())::uuid[])`;
const identityOn = `(select app_identity()) = 'on'`;

const conditions: Record<Reach, string> = {
  record: `${inReach} and ${own}`,
  identity: `${inReach} and ${own} and ${identityOn}`,
  screening: `${inReach} and ${ownScreening}`,
  'screening-identity': `${inReach} and ${ownScreening} and ${identityOn}`,
  known: `(select app_actor()) is not null`,
  account: `(select app_actor()) is not null and ((select app_participant()) is null or account_id = (select app_actor()))`,
  'sign-in': `(select app_identity()) = 'sign-in'`,
};

export interface Watch {
  readonly table: string;
  readonly reach: Reach;
  /** Data-base verbs the application login gets. Never delete, but for drafts and jobs. */
  readonly grants: readonly ('select' | 'insert' | 'update' | 'delete')[];
  /** Columns the audit trail must not hold (secrets). `false` leaves the table out of the trail; say why beside it. */
  readonly audit: { readonly without?: readonly string[]; readonly identity?: boolean } | false;
}

/** The SQL that guards one table. */
export function guard({ table, reach, grants, audit }: Watch): string[] {
  const lines = [
    `alter table ${table} enable row level security`,
    `alter table ${table} force row level security`,
    `create policy ${table}_reach on ${table} using (${conditions[reach]}) with check (${conditions[reach]})`,
    `grant ${grants.join(', ')} on ${table} to app_rw`,
  ];
  if (audit !== false) {
    const without = (audit.without ?? []).join(',');
    lines.push(
      `create trigger ${table}_audit after insert or update or delete on ${table} for each row execute function audit_row('${without}', '${audit.identity ? 'identity' : ''}')`,
    );
  }
  return lines;
}
