import { Migration } from '@mikro-orm/migrations';
import { guard } from './sql';

/** A drawn signature as it is kept: moves and lines of numbers that a page can hold. */
const point = String.raw`\d{1,4}(?:\.\d)? \d{1,4}(?:\.\d)?`;
const drawing = String.raw`^\{"path":"(?:M${point}(?:L${point})*)+","width":\d{2,4},"height":\d{2,4}\}$`;

/** The protocol as data, screening, identity, consent. */
export class ProtocolConsent extends Migration {
  override up(): void {
    this.addSql(`create table protocol_version (
      id uuid primary key default gen_random_uuid(), study_id uuid not null references study, number text not null, document jsonb not null,
      reason text not null, effective_on date not null, version integer not null default 1, unique (study_id, number))`);
    this.addSql(`create table consent_form_version (
      id uuid primary key default gen_random_uuid(), study_id uuid not null references study, number text not null, document jsonb not null,
      effective_on date not null, version integer not null default 1, unique (study_id, number))`);
    this.addSql(`create table screening (
      id uuid primary key default gen_random_uuid(), screening_id uuid generated always as (id) stored, site_id uuid not null references site, participant_id uuid,
      number integer not null, screened_on date not null, cohort text not null, referred_by text,
      state text not null default 'screening' check (state in ('screening', 'not enrolled', 'enrolled')),
      not_enrolled_reason text, not_enrolled_note text, eligibility_confirmed_at timestamptz, eligibility_confirmed_by uuid references account,
      protocol_version_id uuid not null references protocol_version, created_at timestamptz not null default now(), version integer not null default 1,
      unique (site_id, number),
      check ((state = 'not enrolled') = (not_enrolled_reason is not null)), check ((state = 'enrolled') = (participant_id is not null)))`);
    this.addSql(`create table eligibility_answer (
      id uuid primary key default gen_random_uuid(), screening_id uuid not null references screening, site_id uuid not null references site, participant_id uuid,
      criterion text not null, answer text not null check (answer in ('yes', 'no')), version integer not null default 1, unique (screening_id, criterion))`);
    this.addSql(`create table stored_file (
      id uuid primary key default gen_random_uuid(), screening_id uuid not null references screening, site_id uuid not null references site, participant_id uuid,
      storage_key text not null unique, kind text not null check (kind in ('signed consent', 'consent copy')),
      content_type text not null check (content_type in ('application/pdf', 'image/jpeg', 'image/png')),
      byte_count integer not null check (byte_count between 1 and 20000000), sha256 text not null, created_at timestamptz not null default now())`);
    this.addSql(`create table consent (
      id uuid primary key default gen_random_uuid(), screening_id uuid not null references screening, site_id uuid not null references site, participant_id uuid,
      form_version_id uuid not null references consent_form_version, mode text not null check (mode in ('tablet', 'home', 'paper')),
      state text not null default 'reading' check (state in ('reading', 'signed by participant', 'complete', 'set aside')),
      sections_read text[] not null default '{}', permissions jsonb not null default '{}', paper_file_id uuid references stored_file, paper_signed_on date,
      participant_signed_at timestamptz, staff_signed_at timestamptz, staff_signed_by uuid references account, copy_file_id uuid references stored_file,
      created_at timestamptz not null default now(), version integer not null default 1,
      check (state <> 'complete' or (participant_signed_at is not null and staff_signed_at is not null and staff_signed_by is not null)),
      check (mode <> 'paper' or state in ('reading', 'set aside') or paper_file_id is not null))`);
    this.addSql(`create unique index consent_one_open on consent (screening_id) where state in ('reading', 'signed by participant')`);
    this.addSql('create index consent_participant on consent (participant_id)');
    this.addSql('create index consent_screening on consent (screening_id, created_at)');
    this.addSql(`create table consent_signature (
      id uuid primary key default gen_random_uuid(), consent_id uuid not null references consent, screening_id uuid not null references screening, site_id uuid not null references site,
      participant_id uuid, who text not null check (who in ('participant', 'staff')), means text not null check (means in ('typed', 'drawn', 'paper')),
      name text not null, drawing text check (length(drawing) < 60000 and drawing ~ '${drawing}'), signed_at timestamptz not null, content_sha256 text not null, unique (consent_id, who),
      -- Whose account signed second. A participant signs without one.
      account_id uuid references account, check ((who = 'staff') = (account_id is not null)))`);
    this.addSql(`create table participant_identity (
      id uuid primary key default gen_random_uuid(), screening_id uuid not null unique references screening, site_id uuid not null references site, participant_id uuid unique,
      name text not null, email text, phone text, born_on date, version integer not null default 1)`);
    this.addSql(`create table invitation (
      id uuid primary key default gen_random_uuid(), token_hash text not null unique, kind text not null check (kind in ('consent', 'join', 'staff', 'password')),
      site_id uuid, screening_id uuid references screening, participant_id uuid, account_id uuid references account,
      created_at timestamptz not null, expires_at timestamptz not null, used_at timestamptz, version integer not null default 1, check (expires_at > created_at))`);
    const append = ['select', 'insert'] as const;
    const change = ['select', 'insert', 'update'] as const;
    for (const line of [
      ...guard({ table: 'protocol_version', reach: 'known', grants: append, audit: {} }),
      ...guard({ table: 'consent_form_version', reach: 'known', grants: append, audit: {} }),
      ...guard({ table: 'screening', reach: 'screening', grants: change, audit: {} }),
      ...guard({ table: 'eligibility_answer', reach: 'screening', grants: change, audit: {} }),
      ...guard({ table: 'stored_file', reach: 'screening-identity', grants: change, audit: { identity: true } }),
      ...guard({ table: 'consent', reach: 'screening', grants: change, audit: {} }),
      ...guard({ table: 'consent_signature', reach: 'screening-identity', grants: append, audit: { identity: true } }),
      ...guard({ table: 'participant_identity', reach: 'screening-identity', grants: change, audit: { identity: true } }),
      ...guard({ table: 'invitation', reach: 'sign-in', grants: change, audit: { without: ['token_hash'], identity: true } }),
    ])
      this.addSql(line);
    this.signatures();
    this.links();
  }

  /** Nobody signs for another: the participant's own signature comes from an invited person, the second from the account that acts, under its name. */
  private signatures(): void {
    this.addSql(`create function sign_for_oneself() returns trigger language plpgsql as $$ begin
      -- A scene that is laid out has no hands.
      if app_act() = 'demo.seed' then return new; end if;
      if new.who = 'participant' and new.means <> 'paper' and app_role() is distinct from 'invitee' then
        raise exception 'The participant signs in person.' using errcode = '42501';
      end if;
      if new.who = 'staff' and (new.account_id is distinct from app_actor() or not exists (select from account where id = new.account_id and name = new.name)) then
        raise exception 'Each account signs for itself.' using errcode = '42501';
      end if;
      return new; end $$`);
    this.addSql('create trigger consent_signature_own before insert on consent_signature for each row execute function sign_for_oneself()');
  }

  /** A site issues and ends its own links; the holder of a consent link ends it by signing; everything else needs a sign-in act. */
  private links(): void {
    const issuer = `site_id = any ((select app_reach())::uuid[]) and (select app_participant()) is null`;
    const holder = `kind = 'consent' and screening_id = (select app_screening())`;
    const ends = `(select app_identity()) = 'on' and ((${issuer}) or (${holder}))`;
    this.addSql(`create policy invitation_issue on invitation for insert with check (${issuer})`);
    this.addSql(`create policy invitation_ends_read on invitation for select using (${ends})`);
    this.addSql(`create policy invitation_ends on invitation for update using (${ends}) with check (${ends})`);
    // Joining takes the address that the link was sent to; only while somebody joins, and only for people who were invited.
    this.addSql(`create policy participant_identity_join on participant_identity for select using (
      (select app_identity()) = 'sign-in' and (select app_act()) = 'account.join'
      and exists (select 1 from invitation i where i.kind = 'join' and i.participant_id = participant_identity.participant_id))`);
  }
}
