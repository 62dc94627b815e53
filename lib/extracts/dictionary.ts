import type { Profile } from './input';

/**
 * Every column of the record tables with its class and what each profile does to it: the one place. A column that is not
 * here never leaves (tests walk the data base's own list). Classes: DEI-01 of the requirements base, after 45 CFR
 * 164.514(b)(2).
 */
export type DataClass = 'direct' | 'quasi' | 'sensitive' | 'none' | 'free text';

export type Treatment =
  | 'as is'
  | 'left out'
  | 'random number'
  | 'numbered at random'
  | 'study day'
  | 'wide bands'
  | 'narrow bands'
  | 'listed answers only'
  | 'verdict only'
  | 'yes or no only';

export interface Entry {
  readonly class: DataClass;
  /** What the column holds, for people. */
  readonly words: string;
  readonly does: Readonly<Record<Profile, Treatment>>;
  /** An invented value before, and after under each profile. */
  readonly example?: readonly [before: string, after: Readonly<Record<Profile, string>>];
  /** Keys and counters of the data base: left out without being listed to people. */
  readonly inner?: true;
}

const both = (treatment: Treatment): Entry['does'] => ({ open: treatment, controlled: treatment });
const shown = (after: string): Readonly<Record<Profile, string>> => ({ open: after, controlled: after });

const inner: Entry = { class: 'direct', words: 'Key of the data base', does: both('left out'), inner: true };
const counter: Entry = { class: 'none', words: 'Counter of the data base', does: both('left out'), inner: true };
const person: Entry = { class: 'direct', words: 'Participant', does: both('random number'), inner: true };
const place: Entry = { class: 'quasi', words: 'Site of the row', does: both('left out'), inner: true };
const staff = (words: string): Entry => ({ class: 'direct', words, does: both('left out') });
const out = (dataClass: DataClass, words: string): Entry => ({ class: dataClass, words, does: both('left out') });
const text = (words: string): Entry => ({ class: 'free text', words, does: both('left out') });
const asIs = (words: string, dataClass: DataClass = 'none', value?: string): Entry => ({ class: dataClass, words, does: both('as is'), ...(value ? { example: [value, shown('as is')] } : {}) });
const day = (words: string, example?: Entry['example']): Entry => ({ class: 'quasi', words, does: both('study day'), ...(example ? { example } : {}) });

export const dictionary = {
  participant: {
    id: person,
    participant_id: person,
    code: { class: 'direct', words: 'Participant code', does: both('random number'), example: ['NM-0042', shown('P7305518')] },
    site_id: { class: 'quasi', words: 'Site', does: { open: 'left out', controlled: 'numbered at random' }, example: ['Northmoor', { open: 'left out', controlled: 'site 2' }] },
    number: out('direct', 'Running number at the site'),
    age_years: { class: 'quasi', words: 'Age at enrolment', does: { open: 'wide bands', controlled: 'narrow bands' }, example: ['54', { open: '50-59', controlled: '50-54' }] },
    height_mm: { class: 'quasi', words: 'Height', does: { open: 'wide bands', controlled: 'narrow bands' }, example: ['168 cm', { open: '160-169', controlled: '165-169' }] },
    cohort: asIs('Cohort', 'sensitive', 'at-risk'),
    affected_side: asIs('Treated side', 'quasi', 'left'),
    dominant_side: asIs('Dominant hand', 'quasi', 'right'),
    surgery_on: { class: 'quasi', words: 'Day of surgery', does: { open: 'wide bands', controlled: 'narrow bands' }, example: ['21 Apr 2026', { open: '0-25 weeks before', controlled: '0-12 weeks before' }] },
    surgery: asIs('Surgery', 'quasi', 'mastectomy'),
    axillary_procedure: asIs('Axillary procedure', 'quasi', 'sentinel-node-biopsy'),
    nodes_removed: { class: 'quasi', words: 'Nodes removed', does: { open: 'wide bands', controlled: 'narrow bands' }, example: ['14', { open: '11+', controlled: '11-15' }] },
    radiotherapy: asIs('Radiotherapy', 'sensitive', 'regional-nodes'),
    systemic_therapy: asIs('Systemic therapy', 'sensitive', 'endocrine'),
    enrolled_on: day('Day of enrolment', ['9 Jun 2026', shown('day 1')]),
    anchor_on: out('quasi', 'Day the schedule counts from'),
    state: asIs('In the study, withdrawn or completed', 'none', 'enrolled'),
    left_on: { class: 'quasi', words: 'Day of leaving', does: { open: 'left out', controlled: 'narrow bands' }, example: ['8 Dec 2026', { open: 'left out', controlled: '26-38 weeks after' }] },
    left_grade: asIs('What the person withdrew from', 'none'),
    left_reason: text('Reason for leaving, in words'),
    training_held: out('sensitive', 'Training held now'),
    protocol_version_id: asIs('Protocol version enrolled under'),
    version: counter,
  },
  visit: {
    id: inner,
    site_id: place,
    participant_id: person,
    key: asIs('Visit', 'none', 'month-6'),
    name: out('none', 'Name of the visit'),
    target_on: day('Target day', ['3 Dec 2026', shown('day 178')]),
    opens_on: day('Window opens'),
    closes_on: day('Window closes'),
    booked_at: out('quasi', 'Appointment'),
    done_on: day('Day of the visit'),
    state: asIs('State of the visit', 'none', 'complete'),
    missed_reason: text('Why a visit was missed, in words'),
    window_reason: text('Why a visit took place outside its window, in words'),
    unscheduled_reason: { class: 'free text', words: 'Why a visit was added, in words', does: both('yes or no only'), example: ['in words', shown('unscheduled: yes')] },
    protocol_version_id: out('none', 'Protocol version of the visit'),
    version: counter,
  },
  limb_assessment: {
    id: inner,
    site_id: place,
    participant_id: person,
    visit_id: inner,
    assessor_id: staff('Who measured'),
    measured_at: day('Day of measuring'),
    position: asIs('Position of the arm', 'none'),
    sleeve_worn: asIs('Sleeve worn'),
    hours_since_training: asIs('Hours since training'),
    method: asIs('Formula for volume'),
    start_offset_mm: asIs('First level above the wrist'),
    step_mm: asIs('Step between levels'),
    level_count: asIs('Number of levels'),
    tolerance_mm: asIs('Tolerance between trials'),
    state: out('none', 'Open or complete; complete ones leave'),
    body_weight_g: asIs('Body weight', 'sensitive', '71.4 kg'),
    impedance_ratio: asIs('Impedance ratio', 'sensitive', '1.021'),
    impedance_rest_min: asIs('Rest before impedance'),
    remarks: text('Remarks in words'),
    left_volume_ml: asIs('Volume, left', 'sensitive', '2 089 mL'),
    right_volume_ml: asIs('Volume, right', 'sensitive', '2 031 mL'),
    rvc: asIs('Relative volume change', 'sensitive', '+5.1 %'),
    verdicts: { class: 'sensitive', words: 'Verdict of each swelling definition', does: both('verdict only'), example: ['verdict with its reason', shown('met')] },
    findings: text('What the checks said, and the reasons given'),
    formula_version: asIs('Version of the formulas'),
    completed_at: out('quasi', 'Moment of completing'),
    version: counter,
  },
  limb_trial: {
    id: inner,
    site_id: place,
    participant_id: person,
    assessment_id: inner,
    side: asIs('Arm'),
    trial: asIs('Trial'),
    circumferences_mm: asIs('Girth at each level', 'sensitive', '25.8 cm'),
    saved_at: out('quasi', 'Moment of saving'),
    version: counter,
  },
  questionnaire_response: {
    id: inner,
    site_id: place,
    participant_id: person,
    visit_id: inner,
    instrument: asIs('Questionnaire'),
    instrument_version: asIs('Version of the questionnaire'),
    language: out('quasi', 'Language'),
    due_on: day('Day due'),
    opens_on: out('quasi', 'Window opens'),
    closes_on: out('quasi', 'Window closes'),
    state: out('none', 'State; submitted ones leave'),
    answers: { class: 'sensitive', words: 'Answers', does: both('listed answers only'), example: ['2, and words', shown('2')] },
    left_out: { class: 'none', words: 'Questions left out on purpose', does: both('listed answers only') },
    page: counter,
    mode: out('none', 'How it was filled in'),
    started_at: out('quasi', 'Moment of starting'),
    submitted_at: day('Day of submitting'),
    scores: asIs('Scores', 'sensitive', '41.7'),
    version: counter,
  },
  training_session: {
    id: inner,
    site_id: place,
    participant_id: person,
    local_on: day('Day of the session', ['8 Dec 2026', shown('day 183')]),
    time_zone: out('quasi', 'Time zone'),
    entered_at: out('quasi', 'Moment of entering'),
    late: asIs('Entered late'),
    arm_check: asIs('Arm check before loads', 'sensitive', 'the same'),
    soreness: asIs('Soreness', 'sensitive', 'a little'),
    effort: asIs('Effort of the session'),
    note: text('Note in words'),
    client_key: inner,
    version: counter,
  },
  training_set: {
    id: inner,
    site_id: place,
    participant_id: person,
    session_id: inner,
    sequence: asIs('Order in the session'),
    exercise: asIs('Exercise', 'none', 'chest-press'),
    equipment: asIs('Equipment'),
    basis: asIs('What the load means'),
    side: asIs('Side trained'),
    load_typed: asIs('Load as typed'),
    unit: asIs('Unit typed'),
    load_g: asIs('Load', 'none', '6 kg'),
    repetitions: asIs('Repetitions'),
    set_count: asIs('Sets'),
    effort: asIs('Effort'),
    already_lifted: asIs('Lifted before the advice was read'),
  },
  training_flag: {
    id: inner,
    site_id: place,
    participant_id: person,
    session_id: inner,
    flag_key: inner,
    rule: out('none', 'Training rule not met; it can be computed again from the loads'),
    exercise: out('none', 'Exercise of the flag'),
    detail: text('Detail of the flag'),
    state: out('none', 'State of the flag'),
    raised_at: out('quasi', 'Moment of the flag'),
    version: counter,
  },
  symptom_report: {
    id: inner,
    site_id: place,
    participant_id: person,
    reported_at: day('Day of the report'),
    noticed_on: day('Day it was noticed'),
    answers: { class: 'sensitive', words: 'Signs reported', does: both('listed answers only'), example: ['heavy, tight', shown('yes, yes')] },
    level: asIs('Level of the report', 'sensitive', 'S1'),
    note: text('The participant’s own words'),
    due_at: out('quasi', 'Review due'),
    hold_training: asIs('Training held'),
    state: asIs('State of the review'),
    read_at: out('quasi', 'Moment of reading'),
    reviewed_at: day('Day of the review'),
    reviewed_by: staff('Who reviewed'),
    outcome: asIs('Outcome of the review', 'sensitive', 'advice'),
    review_note: text('The reviewer’s words'),
    client_key: inner,
    version: counter,
    waiting_letters_at: out('quasi', 'Moment of the letters that it waits'),
    overdue_letters_at: out('quasi', 'Moment of the letters that it is late'),
  },
} as const satisfies Record<string, Record<string, Entry>>;

export type RecordTable = keyof typeof dictionary;

/** The entry of one column; undefined when it is not classed. */
export function entryOf(table: string, column: string): Entry | undefined {
  return (dictionary as Record<string, Record<string, Entry>>)[table]?.[column];
}

/** What may leave under a profile, as a predicate over `table.column`. */
export function mayLeave(source: string, profile: Profile): boolean {
  const [table = '', column = ''] = source.split('.');
  const entry = entryOf(table, column);
  if (!entry || entry.does[profile] === 'left out') return false;
  if (entry.class === 'direct') return entry.does[profile] === 'random number';
  if (entry.class === 'free text') return entry.does[profile] === 'yes or no only';
  return true;
}

/** What a profile leaves out, in words, for the ledger. */
export function leftOutBy(profile: Profile): string[] {
  const words = Object.values(dictionary).flatMap((columns) =>
    Object.values(columns as Record<string, Entry>)
      .filter((entry) => !entry.inner && entry.does[profile] === 'left out')
      .map((entry) => entry.words),
  );
  return [...new Set(words)];
}
