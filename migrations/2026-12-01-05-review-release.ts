import { Migration } from '@mikro-orm/migrations';
import { guard } from './sql';

/** The margin (queries, verification), and what leaves the house (extracts), and the seals over the trail. */
export class ReviewRelease extends Migration {
  override up(): void {
    const record = `id uuid primary key default gen_random_uuid(), site_id uuid not null references site, participant_id uuid not null references participant`;
    this.addSql(`create table data_query (${record}, number bigint generated always as identity unique, visit_id uuid references visit, target_table text not null, target_id uuid not null, field text not null, field_label text not null,
      origin text not null check (origin in ('manual', 'check')), check_id text, state text not null default 'open' check (state in ('open', 'answered', 'closed', 'cancelled')), raised_by uuid not null references account, raised_at timestamptz not null, due_on date not null, answered_at timestamptz, closed_at timestamptz, version integer not null default 1,
      check (state <> 'answered' or answered_at is not null), check (state not in ('closed', 'cancelled') or closed_at is not null))`);
    this.addSql('create index data_query_site on data_query (site_id, state, raised_at)');
    this.addSql('create index data_query_target on data_query (target_id, field)');
    this.addSql('create index data_query_participant on data_query (participant_id)');
    this.addSql('create index data_query_visit on data_query (visit_id)');
    this.addSql(`create table query_message (${record}, query_id uuid not null references data_query, author_id uuid not null references account, author_role text not null, author_label text not null, kind text not null check (kind in ('question', 'answer', 'ask again', 'close', 'cancel', 'remind', 'reopen')), text text not null check (length(text) between 1 and 1000), at timestamptz not null)`);
    this.addSql('create index query_message_query on query_message (query_id, at)');
    this.addSql(`create table verification (${record}, visit_id uuid references visit, target_table text not null, target_id uuid not null, field text not null, value jsonb, verified_by uuid not null references account, verified_label text not null, verified_at timestamptz not null, fell_at timestamptz, version integer not null default 1)`);
    this.addSql('create unique index verification_standing on verification (target_id, field) where fell_at is null');
    this.addSql('create index verification_participant on verification (participant_id)');
    this.addSql('create index verification_visit on verification (visit_id)');
    for (const table of ['data_query', 'verification']) for (const line of guard({ table, reach: 'record', grants: ['select', 'insert', 'update'], audit: {} })) this.addSql(line);
    for (const line of guard({ table: 'query_message', reach: 'record', grants: ['select', 'insert'], audit: {} })) this.addSql(line);
    // Queries and verification are between site and monitor: a participant does not see them.
    for (const table of ['data_query', 'query_message', 'verification'])
      this.addSql(`create policy ${table}_staff on ${table} as restrictive using ((select app_participant()) is null)`);
    this.marksFall();
    this.extracts();
  }

  /** A verification mark stands on a value and falls when the value changes, whatever changed it. */
  private marksFall(): void {
    this.addSql(`create function marks_fall() returns trigger language plpgsql security definer set search_path = public as $$
    declare before_image jsonb := to_jsonb(old); after_image jsonb := to_jsonb(new);
    begin
      if before_image = after_image then return null; end if;
      update verification set fell_at = app_now(), version = version + 1
      where target_id = new.id and fell_at is null
        and before_image #> string_to_array(field, '.') is distinct from after_image #> string_to_array(field, '.');
      return null;
    end $$`);
    for (const table of ['visit', 'limb_assessment', 'limb_trial', 'participant', 'questionnaire_response', 'training_session', 'symptom_report'])
      this.addSql(`create trigger ${table}_marks after update on ${table} for each row execute function marks_fall()`);
    // The function runs as the owner under forced security: it may touch marks of the rows in reach only.
  }

  private extracts(): void {
    this.addSql(`create table extract (
      id uuid primary key default gen_random_uuid(), study_id uuid not null references study, number bigint generated always as identity unique, profile text not null check (profile in ('open', 'controlled')), purpose text not null check (length(purpose) between 1 and 500), recipient text not null, as_of timestamptz not null,
      state text not null default 'waiting' check (state in ('waiting', 'preparing', 'ready', 'failed')), progress integer not null default 0 check (progress between 0 and 100), files jsonb not null default '[]', removed jsonb not null default '[]', counts jsonb not null default '{}', disclosure jsonb, failure text, requested_by uuid not null references account, requested_label text not null, requested_at timestamptz not null, ready_at timestamptz, version integer not null default 1)`);
    this.addSql(`create table seal (id bigint generated always as identity primary key, tree_size bigint not null unique, last_entry_id bigint not null, below_txid xid8 not null, root_hash text not null, peaks text[] not null, sealed_at timestamptz not null default app_now(), check (root_hash ~ '^[0-9a-f]{64}$'))`);
    for (const line of [
      ...guard({ table: 'extract', reach: 'known', grants: ['select', 'insert', 'update'], audit: {} }),
      // A seal is itself the proof over the trail; it is append-only and never part of it.
      ...guard({ table: 'seal', reach: 'known', grants: ['select'], audit: false }),
    ])
      this.addSql(line);
    this.addSql('create policy extract_staff on extract as restrictive using ((select app_participant()) is null)');
    this.seals();
  }

  /**
   * A seal follows the one before and covers exactly the final entries below its transaction, or it is refused: one that claims
   * more would keep every later one out. The number and the moment are the data base's own.
   */
  private seals(): void {
    this.addSql('grant insert (tree_size, last_entry_id, below_txid, root_hash, peaks) on seal to app_rw');
    this.addSql('create trigger seal_closed before update or delete on seal for each row execute function audit_closed()');
    this.addSql('create trigger seal_kept before truncate on seal for each statement execute function audit_closed()');
    this.addSql(`create function seal_grows() returns trigger language plpgsql security definer set search_path = public as $$
    declare last seal; added bigint; newest bigint;
    begin
      perform pg_advisory_xact_lock(hashtext('seal'));
      select * into last from seal order by tree_size desc limit 1;
      if new.below_txid > pg_snapshot_xmin(pg_current_snapshot()) then
        raise exception 'A seal covers only what is final.' using errcode = '42501';
      end if;
      select count(*), max(id) into added, newest from audit_entry where txid >= coalesce(last.below_txid, '0'::xid8) and txid < new.below_txid;
      if added = 0 or new.tree_size <> coalesce(last.tree_size, 0) + added or new.last_entry_id <> greatest(last.last_entry_id, newest) then
        raise exception 'A seal covers every final entry, and more than the seal before it.' using errcode = '42501';
      end if;
      new.sealed_at := app_now();
      return new;
    end $$`);
    this.addSql('create trigger seal_grows before insert on seal for each row execute function seal_grows()');
  }
}
