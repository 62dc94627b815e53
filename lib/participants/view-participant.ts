import { daysBetween, mondayOf } from '@/instruments/calendar';
import { trainingRule } from '@/instruments/training';
import type { TrainingRuleCode } from '@/instruments/training/define-training-rule';
import { findExercise } from '@/instruments/training/exercises';
import { rvcMeasurementError } from '@/instruments/measurement/rvc-measurement-error';
import { highWater, type HighWater } from '@/instruments/swelling';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { queriesOfFacts, type QueryView } from '@/lib/queries/view-query';
import { reportWords } from '@/lib/safety/report-words';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { changeByTrial } from './change-by-trial';

/** A visit as the participant page lists it. */
export interface ParticipantVisit {
  readonly id: string;
  readonly key: string;
  readonly name: string;
  readonly targetOn: string;
  readonly opensOn: string;
  readonly closesOn: string;
  readonly bookedAt: string | null;
  readonly doneOn: string | null;
  readonly state: 'to come' | 'in progress' | 'complete' | 'missed';
  readonly missedReason: string | null;
  /** Where the visit lies against its window; null while it has no date, and for an unscheduled visit. */
  readonly deltaDays: number | null;
  readonly version: number;
  readonly rvc: number | null;
  /** The change by each of the two trials alone. */
  readonly trials: readonly [number, number] | null;
  readonly impedanceRatio: number | null;
  readonly leftVolumeMl: number | null;
  readonly rightVolumeMl: number | null;
  readonly openQueries: number;
  readonly verifiedCount: number;
}

/** What one participant page shows. Codes and health data; no identity. */
export interface ParticipantView {
  readonly id: string;
  readonly version: number;
  readonly code: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly timeZone: string;
  readonly today: string;
  readonly state: string;
  readonly leftOn: string | null;
  readonly leftGrade: string | null;
  readonly trainingHeld: boolean;
  readonly facts: {
    readonly affectedSide: 'left' | 'right';
    readonly dominantSide: string;
    readonly surgery: string;
    readonly surgeryOn: string;
    readonly axillaryProcedure: string;
    readonly nodesRemoved: number | null;
    readonly radiotherapy: string;
    readonly systemicTherapy: string;
    readonly ageYears: number;
    readonly heightMm: number | null;
    readonly cohort: string;
    readonly enrolledOn: string;
    readonly baselineWeightG: number | null;
  };
  readonly visits: readonly ParticipantVisit[];
  /** What was reported, in words, and how many signs it named. */
  readonly symptoms: readonly { readonly on: string; readonly level: string; readonly said: string; readonly signCount: number }[];
  readonly weeks: readonly { readonly starts: string; readonly loads: Readonly<Record<string, number>>; readonly heaviestKg: Readonly<Record<string, number>> }[];
  readonly exercises: readonly { readonly code: string; readonly name: string }[];
  /** Flags of a safety or deviation rule. */
  readonly flags: readonly { readonly on: string; readonly title: string; readonly exercise: string | null }[];
  /** What is asked about the facts and not yet closed. */
  readonly factQueries: readonly QueryView[];
  readonly consent: { readonly number: string; readonly mode: string; readonly signedAt: string | null } | null;
  readonly threshold: HighWater;
  readonly errorPoints: number;
  /** Days without training from which a break counts. */
  readonly breakDays: number;
}

interface Head {
  id: string;
  version: number;
  code: string;
  site_id: string;
  site_name: string;
  time_zone: string;
  state: string;
  left_on: string | null;
  left_grade: string | null;
  training_held: boolean;
  protocol_version_id: string;
  facts: ParticipantView['facts'];
  consent: ParticipantView['consent'];
}

async function findHead(work: Work, code: string): Promise<Head> {
  const [head] = await work.sql<Head>(
    `select p.id, p.version, p.code, p.site_id, s.name as site_name, s.time_zone, p.state, p.left_on::text, p.left_grade, p.training_held, p.protocol_version_id,
       jsonb_build_object('affectedSide', p.affected_side, 'dominantSide', p.dominant_side, 'surgery', p.surgery, 'surgeryOn', p.surgery_on, 'axillaryProcedure', p.axillary_procedure,
         'nodesRemoved', p.nodes_removed, 'radiotherapy', p.radiotherapy, 'systemicTherapy', p.systemic_therapy, 'ageYears', p.age_years, 'heightMm', p.height_mm, 'cohort', p.cohort, 'enrolledOn', p.enrolled_on,
         'baselineWeightG', (select a.body_weight_g from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = p.id and v.key = 'baseline' and a.state = 'complete' limit 1)) as facts,
       (select jsonb_build_object('number', f.number, 'mode', c.mode, 'signedAt', c.staff_signed_at) from consent c join consent_form_version f on f.id = c.form_version_id
         where c.participant_id = p.id and c.state = 'complete' order by c.staff_signed_at desc limit 1) as consent
     from participant p join site s on s.id = p.site_id where p.code = ?`,
    [code],
  );
  if (!head) throw new Refusal('not-found', 'There is no such participant in your reach.');
  return head;
}

interface VisitRow extends Omit<ParticipantVisit, 'trials' | 'deltaDays'> {
  sides: { side: 'left' | 'right'; trial: number; girthsMm: (number | null)[] }[] | null;
  map: { startOffsetMm: number; stepMm: number; levels: number } | null;
  method: string | null;
}

const visitsOf = (work: Work, id: string): Promise<VisitRow[]> =>
  work.sql<VisitRow>(
    `select v.id, v.key, v.name, v.target_on::text as "targetOn", v.opens_on::text as "opensOn", v.closes_on::text as "closesOn", v.booked_at::text as "bookedAt", v.done_on::text as "doneOn", v.state, v.missed_reason as "missedReason", v.version,
       case when a.state = 'complete' then a.rvc::float8 end as rvc, a.impedance_ratio::float8 as "impedanceRatio",
       a.left_volume_ml::float8 as "leftVolumeMl", a.right_volume_ml::float8 as "rightVolumeMl", a.method,
       case when a.state = 'complete' then jsonb_build_object('startOffsetMm', a.start_offset_mm, 'stepMm', a.step_mm, 'levels', a.level_count) end as map,
       case when a.state = 'complete' then (select jsonb_agg(jsonb_build_object('side', t.side, 'trial', t.trial, 'girthsMm', t.circumferences_mm)) from limb_trial t where t.assessment_id = a.id) end as sides,
       (select count(*)::int from data_query q where q.visit_id = v.id and q.state in ('open', 'answered')) as "openQueries",
       (select count(*)::int from verification m where m.visit_id = v.id and m.fell_at is null) as "verifiedCount"
     from visit v left join limb_assessment a on a.visit_id = v.id where v.participant_id = ? order by coalesce(v.done_on, v.target_on), v.target_on`,
    [id],
  );

interface LoadRow {
  on: string;
  exercise: string;
  kg: number;
  heaviest: number;
}

function weeksOf(rows: readonly LoadRow[]): ParticipantView['weeks'] {
  const weeks = new Map<string, { starts: string; loads: Record<string, number>; heaviestKg: Record<string, number> }>();
  for (const { on, exercise, kg, heaviest } of rows) {
    const starts = mondayOf(on);
    const week = weeks.get(starts) ?? { starts, loads: {}, heaviestKg: {} };
    week.loads[exercise] = (week.loads[exercise] ?? 0) + kg;
    week.heaviestKg[exercise] = Math.max(week.heaviestKg[exercise] ?? 0, heaviest);
    weeks.set(starts, week);
  }
  return [...weeks.values()].sort((a, b) => (a.starts < b.starts ? -1 : 1));
}

/** One participant by code, with visits, symptoms and load: a constant number of statements. @throws Refusal 'not-found' out of reach. */
export async function viewParticipant(work: Work, { code }: { code: string }): Promise<ParticipantView> {
  const head = await findHead(work, code);
  const { document } = await findProtocol(work, head.protocol_version_id);
  const visits = await visitsOf(work, head.id);
  const symptoms = await work.sql<{ on: string; level: string; answers: { signs?: unknown[] } }>(
    'select noticed_on::text as "on", level, answers from symptom_report where participant_id = ? order by noticed_on',
    [head.id],
  );
  const loads = await work.sql<LoadRow>(
    `select s.local_on::text as "on", t.exercise, sum(t.load_g / 1000.0 * t.repetitions * t.set_count)::float8 as kg, max(t.load_g / 1000.0)::float8 as heaviest
     from training_session s join training_set t on t.session_id = s.id where s.participant_id = ? group by s.local_on, t.exercise order by s.local_on`,
    [head.id],
  );
  const flags = await work.sql<{ on: string; rule: TrainingRuleCode; exercise: string | null }>(
    `select s.local_on::text as "on", f.rule, f.exercise from training_flag f join training_session s on s.id = f.session_id where f.participant_id = ? and f.state <> 'withdrawn' and f.detail ->> 'severity' in ('safety', 'deviation') order by s.local_on`,
    [head.id],
  );
  const baseline = visits.find(({ key, rvc, sides }) => key === 'baseline' && sides !== null && rvc === null);
  return {
    id: head.id,
    version: head.version,
    factQueries: await queriesOfFacts(work, head.id),
    code: head.code,
    siteId: head.site_id,
    siteName: head.site_name,
    timeZone: head.time_zone,
    today: localDate(work.now, head.time_zone),
    state: head.state,
    leftOn: head.left_on,
    leftGrade: head.left_grade,
    trainingHeld: head.training_held,
    facts: { ...head.facts, cohort: document.cohorts.find(({ key }) => key === head.facts.cohort)?.name ?? head.facts.cohort },
    visits: visits.map(({ sides, map, method, ...visit }) => ({
      ...visit,
      deltaDays: visit.doneOn === null || visit.key === 'extra' ? null : daysBetween({ from: visit.targetOn, to: visit.doneOn }),
      trials: sides && map && baseline?.leftVolumeMl && baseline.rightVolumeMl ? changeByTrial({ sides, map, method, affectedSide: head.facts.affectedSide, baseline: { leftMl: baseline.leftVolumeMl, rightMl: baseline.rightVolumeMl } }) : null,
    })),
    symptoms: symptoms.map(({ on, level, answers }) => ({ on, level, said: reportWords(answers), signCount: Math.max(1, answers.signs?.length ?? 0) })),
    weeks: weeksOf(loads),
    exercises: document.exercises.map((exercise) => ({ code: exercise, name: findExercise(exercise)?.name ?? exercise })),
    flags: flags.map(({ on, rule, exercise }) => ({ on, title: trainingRule(rule).title, exercise: exercise === null ? null : (findExercise(exercise)?.name ?? exercise) })),
    breakDays: document.training.breakDays,
    consent: head.consent,
    threshold: highWater(document.swelling.primary),
    errorPoints: rvcMeasurementError(document.measurement.semPct),
  };
}
