import { Migration } from '@mikro-orm/migrations';

/**
 * What everything stands on: the login's group role, the settings a transaction
 * carries, and the audit trail that writes itself.
 */
export class Foundation extends Migration {
  override up(): void {
    this.addSql(`do $$ begin
      if not exists (select 1 from pg_roles where rolname = 'app_rw') then create role app_rw nologin; end if;
    end $$`);
    this.addSql('grant usage on schema public to app_rw');
    this.addSql('revoke create on schema public from public');
    this.settings();
    this.audit();
    this.addSql(`create table worker_heartbeat (worker text primary key, seen_at timestamptz not null)`);
    // Operational, no personal data: outside the audit trail.
    this.addSql('grant select, insert, update on worker_heartbeat to app_rw');
    this.addSql('alter table worker_heartbeat enable row level security');
    this.addSql('alter table worker_heartbeat force row level security');
    this.addSql('create policy worker_heartbeat_reach on worker_heartbeat using (true) with check (true)');
  }

  /** A setting reads '' after its transaction, not null: every reader maps '' to null. */
  private settings(): void {
    const reader = (name: string, setting: string, type: string) =>
      this.addSql(
        `create function ${name}() returns ${type} language sql stable parallel safe as $$ select nullif(current_setting('${setting}', true), '')::${type} $$`,
      );
    reader('app_actor', 'app.actor', 'uuid');
    reader('app_participant', 'app.participant', 'uuid');
    reader('app_screening', 'app.screening', 'uuid');
    reader('app_identity', 'app.identity', 'text');
    reader('app_act', 'app.act', 'text');
    reader('app_role', 'app.role', 'text');
    reader('app_reason', 'app.reason', 'text');
    reader('app_request', 'app.request', 'text');
    this.addSql(`create function app_reach() returns uuid[] language sql stable parallel safe as $$
      select coalesce(string_to_array(nullif(current_setting('app.reach', true), ''), ',')::uuid[], '{}') $$`);
  }

  private audit(): void {
    // The moment the trail is written with. Only the owner of the tables may set another (to load a record made before); the application never can.
    this.addSql(`create function app_now() returns timestamptz language sql stable security definer set search_path = public as $$
      select coalesce(case when pg_has_role(session_user, current_user, 'usage') then nullif(current_setting('app.clock', true), '')::timestamptz end, now()) $$`);
    this.addSql(`create table audit_entry (
      id bigint generated always as identity primary key,
      at timestamptz not null default app_now(),
      txid xid8 not null default pg_current_xact_id(),
      actor_id uuid not null,
      role text not null,
      site_id uuid,
      participant_id uuid,
      act text not null,
      reason text,
      request text,
      table_name text not null,
      row_id text not null,
      op text not null check (op in ('INSERT', 'UPDATE', 'DELETE', 'EVENT')),
      before jsonb,
      after jsonb,
      identity boolean not null default false
    )`);
    this.addSql('create index audit_entry_row on audit_entry (table_name, row_id, id)');
    this.addSql('create index audit_entry_site on audit_entry (site_id, id)');
    this.addSql('create index audit_entry_participant on audit_entry (participant_id, id)');
    // The order in which seals take rows: a lower id may commit after a higher one, a lower transaction below the horizon may not.
    this.addSql('create index audit_entry_txid on audit_entry (txid, id)');
    this.addSql('create index audit_entry_at on audit_entry (at, id)');
    this.addSql('create index audit_entry_actor on audit_entry (actor_id, id)');
    this.addSql('alter table audit_entry enable row level security');
    this.addSql('alter table audit_entry force row level security');
    // Accounts and roles stand at no site and may carry a code: a site's own people do not see them.
    this.addSql(`create function app_whole_study() returns boolean language plpgsql stable as $$ begin
      return app_actor() is not null and not exists (select from site where id <> all (app_reach())); end $$`);
    // Rows of no site (accounts, study set-up) are seen by whoever reaches the whole study; identity rows only where identity may be read.
    this.addSql(`create policy audit_entry_reach on audit_entry for select using (
      (site_id = any ((select app_reach())::uuid[]) or (site_id is null and (select app_participant()) is null and (select app_whole_study())))
      and ((select app_participant()) is null or participant_id = (select app_participant()))
      and (not identity or (select app_identity()) = 'on'))`);
    // The trigger function runs as the owner; forced security needs its insert allowed. Nobody is granted insert.
    this.addSql('create policy audit_entry_write on audit_entry for insert with check (true)');
    this.addSql('grant select on audit_entry to app_rw');
    this.addSql(`create function audit_closed() returns trigger language plpgsql as $$ begin
      raise exception 'The audit trail only grows.' using errcode = '42501'; end $$`);
    this.addSql(`create trigger audit_entry_closed before update or delete on audit_entry for each row execute function audit_closed()`);
    this.addSql(`create trigger audit_entry_kept before truncate on audit_entry for each statement execute function audit_closed()`);
    this.auditRow();
    this.auditEvent();
  }

  /** Writes the whole row image before and after. Refuses a write when no act is set. */
  private auditRow(): void {
    this.addSql(`create function audit_row() returns trigger language plpgsql security definer set search_path = public as $$
    declare
      old_image jsonb := case when tg_op = 'INSERT' then null else to_jsonb(old) end;
      new_image jsonb := case when tg_op = 'DELETE' then null else to_jsonb(new) end;
      image jsonb := coalesce(new_image, old_image);
      secret text[] := string_to_array(tg_argv[0], ',');
    begin
      if app_act() is null or app_actor() is null then
        raise exception 'A write needs an act and an actor (%).', tg_table_name using errcode = '42501';
      end if;
      if tg_op = 'UPDATE' and old_image = new_image then return null; end if;
      insert into audit_entry (actor_id, role, site_id, participant_id, act, reason, request, table_name, row_id, op, before, after, identity)
      values (app_actor(), coalesce(app_role(), 'system'),
        coalesce((image ->> 'site_id')::uuid, case when tg_table_name = 'site' then (image ->> 'id')::uuid end),
        coalesce((image ->> 'participant_id')::uuid, case when tg_table_name = 'participant' then (image ->> 'id')::uuid end),
        app_act(), app_reason(), app_request(), tg_table_name,
        coalesce(image ->> 'id', image ->> 'account_id'), tg_op, old_image - secret, new_image - secret, tg_argv[1] = 'identity');
      return null;
    end $$`);
  }

  /** What changes no row and must be traceable all the same: a sign-in, a reading of identity data, a download. */
  private auditEvent(): void {
    this.addSql(`create function audit_event(subject text, subject_id text, detail jsonb, of_site uuid, of_participant uuid) returns void
    language plpgsql security definer set search_path = public as $$ begin
      if app_act() is null or app_actor() is null then
        raise exception 'An event needs an act and an actor.' using errcode = '42501';
      end if;
      insert into audit_entry (actor_id, role, site_id, participant_id, act, reason, request, table_name, row_id, op, after)
      values (app_actor(), coalesce(app_role(), 'system'), of_site, of_participant, app_act(), app_reason(), app_request(), subject, subject_id, 'EVENT', detail);
    end $$`);
    this.addSql('revoke all on function audit_event(text, text, jsonb, uuid, uuid) from public');
    this.addSql('grant execute on function audit_event(text, text, jsonb, uuid, uuid) to app_rw');
  }
}
