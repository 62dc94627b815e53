import { Migration } from '@mikro-orm/migrations';
import { guard } from './sql';

/** Columns that every row of a participant's record carries. */
const record = `id uuid primary key default gen_random_uuid(), site_id uuid not null references site, participant_id uuid not null references participant`;

/** The participant and what is recorded at visits and at home. */
export class TheRecord extends Migration {
  override up(): void {
    this.addSql(`create table participant (
      id uuid primary key default gen_random_uuid(), participant_id uuid generated always as (id) stored, site_id uuid not null references site, code text not null unique,
      number integer not null, cohort text not null, affected_side text not null check (affected_side in ('left', 'right')),
      dominant_side text not null check (dominant_side in ('left', 'right', 'both')), age_years integer not null check (age_years between 18 and 110),
      height_mm integer check (height_mm between 1200 and 2100), surgery_on date not null, surgery text not null, axillary_procedure text not null, nodes_removed integer check (nodes_removed between 0 and 80),
      radiotherapy text not null, systemic_therapy text not null, enrolled_on date not null, anchor_on date not null,
      state text not null default 'enrolled' check (state in ('enrolled', 'withdrawn', 'completed')), left_on date, left_grade text check (left_grade in ('stops training', 'no visits', 'no further data')), left_reason text,
      training_held boolean not null default false, protocol_version_id uuid not null references protocol_version, version integer not null default 1,
      unique (site_id, number), check ((state = 'enrolled') = (left_on is null)))`);
    this.addSql('create index participant_site on participant (site_id, code)');
    for (const table of ['screening', 'eligibility_answer', 'stored_file', 'consent', 'consent_signature', 'participant_identity', 'invitation'])
      this.addSql(`alter table ${table} add foreign key (participant_id) references participant deferrable initially deferred`);
    this.addSql('alter table role_grant add foreign key (of_participant_id) references participant');
    this.addSql(`create table visit (${record},
      key text not null, name text not null, target_on date not null, opens_on date not null, closes_on date not null, booked_at timestamptz, done_on date,
      state text not null default 'to come' check (state in ('to come', 'in progress', 'complete', 'missed')), missed_reason text, unscheduled_reason text, window_reason text,
      protocol_version_id uuid not null references protocol_version, version integer not null default 1,
      check (opens_on <= target_on and target_on <= closes_on), check ((state = 'missed') = (missed_reason is not null)), check ((state in ('in progress', 'complete')) = (done_on is not null)))`);
    this.addSql(`create unique index visit_scheduled_once on visit (participant_id, key) where unscheduled_reason is null`);
    this.addSql('create index visit_site_due on visit (site_id, state, closes_on)');
    this.addSql('create index visit_participant on visit (participant_id, target_on)');
    // The day's work looks for what has not ended: by its day, and by its appointment.
    this.addSql(`create index visit_open on visit (site_id, target_on) where state in ('to come', 'in progress')`);
    this.addSql(`create index visit_booked on visit (site_id, booked_at) where booked_at is not null and state in ('to come', 'in progress')`);
    this.addSql(`create table limb_assessment (${record}, visit_id uuid not null unique references visit, assessor_id uuid not null references account, measured_at timestamptz not null,
      position text, sleeve_worn boolean, hours_since_training integer check (hours_since_training between 0 and 999), method text not null, start_offset_mm integer not null, step_mm integer not null check (step_mm > 0),
      level_count integer not null check (level_count between 2 and 30), tolerance_mm integer not null, state text not null default 'open' check (state in ('open', 'complete')),
      body_weight_g integer check (body_weight_g between 30000 and 250000), impedance_ratio numeric(5,3) check (impedance_ratio between 0.5 and 3), impedance_rest_min integer check (impedance_rest_min between 0 and 120),
      remarks text, left_volume_ml numeric(8,3), right_volume_ml numeric(8,3), rvc numeric(9,6), verdicts jsonb not null default '{}', findings jsonb not null default '[]', formula_version text, completed_at timestamptz, version integer not null default 1,
      check (state = 'open' or (left_volume_ml is not null and right_volume_ml is not null and formula_version is not null and position is not null and sleeve_worn is not null)))`);
    this.addSql('create index limb_assessment_participant on limb_assessment (participant_id, measured_at)');
    this.addSql(`create table limb_trial (${record}, assessment_id uuid not null references limb_assessment, side text not null check (side in ('left', 'right')), trial integer not null check (trial between 1 and 3),
      circumferences_mm integer[] not null, saved_at timestamptz not null, version integer not null default 1, unique (assessment_id, side, trial),
      check (cardinality(circumferences_mm) between 2 and 30), check (100 <= all (circumferences_mm)), check (700 >= all (circumferences_mm)))`);
    this.addSql('create index limb_trial_participant on limb_trial (participant_id)');
    this.addSql(`create table questionnaire_response (${record}, visit_id uuid references visit, instrument text not null, instrument_version integer not null, language text not null default 'en', due_on date not null, opens_on date not null, closes_on date not null,
      state text not null default 'due' check (state in ('due', 'in progress', 'submitted', 'missed')), answers jsonb not null default '{}', left_out text[] not null default '{}', page integer not null default 0, mode text not null default 'self, web', started_at timestamptz, submitted_at timestamptz, scores jsonb not null default '{}', version integer not null default 1,
      check ((state = 'submitted') = (submitted_at is not null)), check (opens_on <= due_on and due_on <= closes_on), unique (participant_id, instrument, due_on))`);
    this.addSql('create index questionnaire_response_site on questionnaire_response (site_id, state, closes_on)');
    this.addSql('create index questionnaire_response_visit on questionnaire_response (visit_id)');
    this.addSql(`create index questionnaire_response_open on questionnaire_response (site_id, due_on) where state in ('due', 'in progress')`);
    this.addSql(`create table training_session (${record}, local_on date not null, time_zone text not null, entered_at timestamptz not null, late boolean not null default false,
      arm_check text not null check (arm_check in ('the same', 'a little fuller', 'clearly fuller', 'not sure')), soreness text not null check (soreness in ('no', 'a little', 'a lot')), effort integer check (effort between 0 and 10), note text check (length(note) <= 500),
      client_key uuid not null, version integer not null default 1, unique (participant_id, client_key))`);
    this.addSql('create index training_session_participant on training_session (participant_id, local_on)');
    this.addSql(`create table training_set (${record}, session_id uuid not null references training_session, sequence integer not null, exercise text not null, equipment text not null, basis text not null, side text not null check (side in ('left', 'right', 'both')),
      load_typed numeric(7,2) not null check (load_typed >= 0), unit text not null check (unit in ('kg', 'lb')), load_g integer not null check (load_g between 0 and 150000), repetitions integer not null check (repetitions between 1 and 100), set_count integer not null check (set_count between 1 and 20), effort integer check (effort between 0 and 10), already_lifted boolean not null default false, unique (session_id, sequence))`);
    this.addSql('create index training_set_participant on training_set (participant_id)');
    this.addSql(`create table training_flag (${record}, session_id uuid not null references training_session, flag_key text not null, rule text not null, exercise text, detail jsonb not null default '{}', state text not null default 'raised' check (state in ('raised', 'withdrawn', 'seen')), raised_at timestamptz not null, version integer not null default 1, unique (participant_id, flag_key))`);
    this.addSql(`create table symptom_report (${record}, reported_at timestamptz not null, noticed_on date not null, answers jsonb not null, level text not null check (level in ('S0', 'S1', 'S2', 'S3', 'R1', 'R1+', 'R2', 'R3', 'R4')), note text check (length(note) <= 1000), due_at timestamptz, hold_training boolean not null,
      state text not null default 'new' check (state in ('new', 'read', 'reviewed')), read_at timestamptz, reviewed_at timestamptz, reviewed_by uuid references account, outcome text check (outcome in ('no action', 'advice', 'unscheduled visit', 'adverse event')), review_note text, client_key uuid not null, version integer not null default 1,
      -- When letters about it were put in the queue: each kind once.
      waiting_letters_at timestamptz, overdue_letters_at timestamptz,
      check ((state = 'reviewed') = (outcome is not null)))`);
    // The same words sent twice are one report; other words under a key that was used before are another.
    this.addSql(`create unique index symptom_report_once on symptom_report (participant_id, client_key, md5(answers::text), noticed_on, md5(coalesce(note, '')))`);
    this.addSql('create index symptom_report_site on symptom_report (site_id, state, due_at)');
    for (const table of ['participant', 'visit', 'limb_assessment', 'limb_trial', 'questionnaire_response', 'training_session', 'training_set', 'training_flag', 'symptom_report'])
      for (const line of guard({ table, reach: 'record', grants: table === 'training_set' ? ['select', 'insert'] : ['select', 'insert', 'update'], audit: {} })) this.addSql(line);
    this.consentFirst();
    this.reasonForChange();
    this.submitCloses();
    this.visitInStudy();
  }

  /** Nothing is recorded before consent is complete, whoever asks. */
  private consentFirst(): void {
    this.addSql(`create function consent_first() returns trigger language plpgsql security definer set search_path = public as $$ begin
      if not exists (select 1 from consent where participant_id = new.id and state = 'complete') then
        raise exception 'Consent is not complete, so nobody can be enrolled on it.' using errcode = 'TM002';
      end if;
      return new; end $$`);
    this.addSql(`create constraint trigger participant_consent_first after insert on participant deferrable initially deferred for each row execute function consent_first()`);
  }

  /** A value that was saved changes only with a reason: a completed limb assessment, its trials, a finished visit, the fixed facts of a participant, the identity of somebody who signed, an answer that eligibility was confirmed on. */
  private reasonForChange(): void {
    this.addSql(`create function reason_for_change() returns trigger language plpgsql security definer set search_path = public as $$
    declare
      settled boolean := true;
      kept text[] := string_to_array(tg_argv[0], ',');
      before_image jsonb; after_image jsonb;
    begin
      if tg_table_name = 'limb_trial' then
        select a.state = 'complete' into settled from limb_assessment a where a.id = new.assessment_id;
      elsif tg_table_name = 'limb_assessment' then settled := old.state = 'complete';
      elsif tg_table_name = 'visit' then settled := old.state in ('complete', 'missed');
      elsif tg_table_name = 'participant_identity' then settled := exists (select from consent c where c.screening_id = new.screening_id and c.state in ('signed by participant', 'complete'));
      elsif tg_table_name = 'eligibility_answer' then select s.eligibility_confirmed_at is not null into settled from screening s where s.id = new.screening_id;
      end if;
      if settled and app_reason() is null then
        select jsonb_object_agg(key, value) into before_image from jsonb_each(to_jsonb(old)) where key = any (kept);
        select jsonb_object_agg(key, value) into after_image from jsonb_each(to_jsonb(new)) where key = any (kept);
        if before_image is distinct from after_image then
          raise exception 'Say why the value changes.' using errcode = 'TM001';
        end if;
      end if;
      return new; end $$`);
    const watch: Record<string, string> = {
      limb_trial: 'circumferences_mm',
      limb_assessment: 'body_weight_g,impedance_ratio,impedance_rest_min,position,sleeve_worn,hours_since_training,remarks,measured_at',
      visit: 'done_on,missed_reason,state',
      participant_identity: 'name,email,phone,born_on',
      eligibility_answer: 'answer',
      participant: 'affected_side,dominant_side,surgery_on,surgery,axillary_procedure,nodes_removed,radiotherapy,systemic_therapy,height_mm,age_years',
    };
    for (const [table, columns] of Object.entries(watch))
      this.addSql(`create trigger ${table}_reason before update on ${table} for each row execute function reason_for_change('${columns}')`);
  }

  /** What takes place, is booked or is added lies between the enrolment and a year after the last window of the schedule. */
  private visitInStudy(): void {
    this.addSql(`create function visit_in_study() returns trigger language plpgsql security definer set search_path = public as $$
    declare
      first_on date; last_on date; booked_on date := (new.booked_at at time zone 'UTC')::date;
    begin
      select enrolled_on into first_on from participant where id = new.participant_id;
      select max(closes_on) into last_on from visit where participant_id = new.participant_id and unscheduled_reason is null;
      last_on := greatest(last_on, case when new.unscheduled_reason is null then new.closes_on end) + 365;
      -- An appointment is a moment: by the clock of the site its day may lie one off.
      if new.done_on < first_on or new.done_on > last_on or booked_on < first_on - 1 or booked_on > last_on + 1
        or (new.unscheduled_reason is not null and (new.target_on < first_on or new.target_on > last_on)) then
        raise exception 'The day lies outside the participant''s time in the study.' using errcode = 'TM004';
      end if;
      return new; end $$`);
    this.addSql(`create trigger visit_in_study before insert or update of done_on, booked_at, target_on, unscheduled_reason on visit for each row
      when (new.done_on is not null or new.booked_at is not null or new.unscheduled_reason is not null) execute function visit_in_study()`);
  }

  /** Submit closes a questionnaire: its answers never change after it. */
  private submitCloses(): void {
    this.addSql(`create function submit_closes() returns trigger language plpgsql as $$ begin
      if old.state = 'submitted' and (new.answers <> old.answers or new.state <> old.state or new.left_out <> old.left_out) then
        raise exception 'A submitted questionnaire is closed.' using errcode = 'TM003';
      end if;
      return new; end $$`);
    this.addSql('create trigger questionnaire_response_closed before update on questionnaire_response for each row execute function submit_closes()');
  }
}
