import { Migration } from '@mikro-orm/migrations';
import { guard } from './sql';

/** Study, sites, the people who work in it, and how they sign in. */
export class People extends Migration {
  override up(): void {
    this.addSql(`create table study (
      id uuid primary key default gen_random_uuid(), name text not null unique, starts_on date not null, ends_on date not null,
      recruitment_target integer not null check (recruitment_target > 0), version integer not null default 1,
      check (ends_on > starts_on))`);
    this.addSql(`create table site (
      id uuid primary key default gen_random_uuid(), study_id uuid not null references study, code text not null unique check (code ~ '^[A-Z]{2}$'),
      name text not null unique, time_zone text not null, phone text not null, email text not null,
      recruitment_target integer not null check (recruitment_target > 0), participant_count integer not null default 0, screening_count integer not null default 0,
      version integer not null default 1)`);
    this.addSql(`create table account (
      id uuid primary key default gen_random_uuid(), account_id uuid generated always as (id) stored, kind text not null check (kind in ('staff', 'participant', 'system')),
      label text not null, state text not null default 'active' check (state in ('invited', 'active', 'closed')), created_at timestamptz not null default now(), version integer not null default 1,
      -- The name that a person of the staff signs with. A participant's name is identity data and stands in its own table.
      name text check (name is null or kind = 'staff'))`);
    this.addSql(`create table credential (
      account_id uuid primary key references account, email text not null check (email = lower(email)), password_hash text,
      changed_at timestamptz not null default now(), version integer not null default 1)`);
    this.addSql('create unique index credential_email on credential (email)');
    this.addSql(`create table role_grant (
      id uuid primary key default gen_random_uuid(), account_id uuid not null references account, study_id uuid not null references study,
      role text not null check (role in ('participant', 'site-coordinator', 'assessor', 'site-investigator', 'monitor', 'investigator', 'data-manager', 'administrator', 'auditor')),
      label text not null, whole_study boolean not null default false, site_ids uuid[] not null default '{}', of_participant_id uuid,
      starts_at timestamptz not null default now(), ends_at timestamptz, version integer not null default 1,
      check (ends_at is null or ends_at > starts_at),
      check (whole_study <> (cardinality(site_ids) > 0)),
      check ((role = 'participant') = (of_participant_id is not null)))`);
    this.addSql('create index role_grant_account on role_grant (account_id)');
    this.addSql(`create table app_session (
      id uuid primary key default gen_random_uuid(), account_id uuid not null references account, token_hash text not null unique, role_grant_id uuid references role_grant,
      -- While a tablet is in a participant's hands the session reaches this screening and nothing else.
      handed_over_screening_id uuid, handed_over_site_id uuid, check ((handed_over_screening_id is null) = (handed_over_site_id is null)),
      created_at timestamptz not null, seen_at timestamptz not null, expires_at timestamptz not null, ended_at timestamptz)`);
    this.addSql('create index app_session_account on app_session (account_id) where ended_at is null');
    this.addSql(`create table rate_hit (bucket text not null, at timestamptz not null)`);
    this.addSql('create index rate_hit_bucket on rate_hit (bucket, at)');
    this.addSql(`create table idempotency_key (
      account_id uuid not null, key text not null, request_hash text not null, status integer, body jsonb, created_at timestamptz not null default now(), primary key (account_id, key))`);
    for (const line of [
      ...guard({ table: 'study', reach: 'known', grants: ['select', 'update'], audit: {} }),
      ...guard({ table: 'site', reach: 'known', grants: ['select', 'update'], audit: {} }),
      ...guard({ table: 'account', reach: 'account', grants: ['select', 'insert', 'update'], audit: {} }),
      ...guard({ table: 'credential', reach: 'sign-in', grants: ['select', 'insert', 'update'], audit: { without: ['password_hash', 'email'], identity: true } }),
      ...guard({ table: 'role_grant', reach: 'account', grants: ['select', 'insert', 'update'], audit: {} }),
      // Sessions, throttling and replays change with every request; sign-ins themselves are audited as events.
      ...guard({ table: 'app_session', reach: 'sign-in', grants: ['select', 'insert', 'update'], audit: false }),
      ...guard({ table: 'rate_hit', reach: 'sign-in', grants: ['select', 'insert', 'delete'], audit: false }),
      ...guard({ table: 'idempotency_key', reach: 'account', grants: ['select', 'insert', 'update'], audit: false }),
    ])
      this.addSql(line);
    // Who signs what nobody signs by hand: jobs, and people who hold a link but have no account yet.
    const system = '00000000-0000-4000-8000-000000000001';
    const invitee = '00000000-0000-4000-8000-000000000002';
    this.addSql(`select set_config('app.actor', '${system}', true), set_config('app.act', 'study.migrate', true), set_config('app.role', 'system', true)`);
    this.addSql(`insert into account (id, kind, label) values ('${system}', 'system', 'Tidemark'), ('${invitee}', 'system', 'Invited person')`);
    // A replayed answer may hold a record: only its own account reads it.
    this.addSql('drop policy idempotency_key_reach on idempotency_key');
    this.addSql(
      `create policy idempotency_key_reach on idempotency_key using (account_id = (select app_actor())) with check (account_id = (select app_actor()))`,
    );
  }
}
