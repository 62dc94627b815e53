import { swellingDefinitions } from '@/instruments/swelling';
import { otherPositions } from '@/lib/measurement/input';
import { code, day, defineExtractFile, integer, key, number, scheduleDay, yesOrNo, type ExtractColumn } from '../define-extract-file';

/** Visits are numbered by target day within a person; other files name a visit by this number. */
export const visitPlace = '(select id, row_number() over (partition by participant_id order by target_on, key, id)::int as number from visit)';
const arms = ['left', 'right'];
const ofVisit = { name: 'visit_number', label: 'Visit, as numbered in visits', from: ['visit.target_on'], kind: 'integer', sql: 'place.number' } as const satisfies ExtractColumn;

export const visits = defineExtractFile({
  name: 'visits',
  about: 'One row for each visit, scheduled or not',
  table: 'visit',
  joins: `join ${visitPlace} place on place.id = r.id`,
  on: 'coalesce(r.done_on, r.target_on)',
  order: 'place.number',
  columns: [
    { ...ofVisit, label: 'Number of the visit within the person' },
    key('visit', { label: 'Visit of the schedule', from: 'visit.key' }),
    yesOrNo('unscheduled', { label: 'Added outside the schedule', from: 'visit.unscheduled_reason', sql: 'r.unscheduled_reason is not null' }),
    scheduleDay('target_day', { label: 'Target day', from: 'visit.target_on' }),
    scheduleDay('opens_day', { label: 'First day of the window', from: 'visit.opens_on' }),
    scheduleDay('closes_day', { label: 'Last day of the window', from: 'visit.closes_on' }),
    day('done_day', { label: 'Day of the visit', from: 'visit.done_on' }),
    code('state', ['to come', 'in progress', 'complete', 'missed'], { label: 'State of the visit', from: 'visit.state' }),
  ],
});

const verdicts: ExtractColumn[] = swellingDefinitions.map(({ code: definition, name, sentence }) =>
  code(`swelling_${definition.toLowerCase()}`, ['met', 'not met', 'not judged'], { label: `${definition}, ${name}: ${sentence}`, from: 'limb_assessment.verdicts', sql: `r.verdicts -> '${definition}' ->> 'verdict'` }),
);

export const limbAssessments = defineExtractFile({
  name: 'limb_assessments',
  about: 'One row for each complete assessment of both arms',
  table: 'limb_assessment',
  joins: `join visit v on v.id = r.visit_id join protocol_version protocol on protocol.id = v.protocol_version_id join ${visitPlace} place on place.id = r.visit_id`,
  on: 'v.done_on',
  where: `r.state = 'complete'`,
  order: 'place.number',
  columns: [
    ofVisit,
    day('measured_day', { label: 'Day of measuring', from: 'limb_assessment.measured_at', moment: true }),
    code('position', ['as the protocol says', ...otherPositions], {
      label: 'Position of the arm',
      from: 'limb_assessment.position',
      sql: `case when r.position = protocol.document #>> '{measurement,position}' then 'as the protocol says' else r.position end`,
    }),
    yesOrNo('sleeve_worn', { label: 'Compression sleeve worn before measuring', from: 'limb_assessment.sleeve_worn' }),
    integer('hours_since_training', { label: 'Hours since the last session', from: 'limb_assessment.hours_since_training', unit: 'h' }),
    code('method', ['frustum', 'disk'], { label: 'Formula for volume', from: 'limb_assessment.method' }),
    integer('start_offset_mm', { label: 'First level above the wrist', from: 'limb_assessment.start_offset_mm', unit: 'mm' }),
    integer('step_mm', { label: 'Step between levels', from: 'limb_assessment.step_mm', unit: 'mm' }),
    integer('level_count', { label: 'Number of levels', from: 'limb_assessment.level_count' }),
    integer('tolerance_mm', { label: 'Largest difference between two trials', from: 'limb_assessment.tolerance_mm', unit: 'mm' }),
    number('body_weight_kg', { label: 'Body weight', from: 'limb_assessment.body_weight_g', unit: 'kg', sql: 'r.body_weight_g / 1000.0' }),
    number('impedance_ratio', { label: 'Impedance ratio, unaffected over at-risk arm', from: 'limb_assessment.impedance_ratio' }),
    integer('impedance_rest_min', { label: 'Rest before impedance', from: 'limb_assessment.impedance_rest_min', unit: 'min' }),
    number('left_volume_ml', { label: 'Volume of the left arm', from: 'limb_assessment.left_volume_ml', unit: 'mL' }),
    number('right_volume_ml', { label: 'Volume of the right arm', from: 'limb_assessment.right_volume_ml', unit: 'mL' }),
    number('rvc', { label: 'Relative volume change since baseline, as a proportion', from: 'limb_assessment.rvc' }),
    ...verdicts,
    key('formula_version', { label: 'Version of the formulas', from: 'limb_assessment.formula_version' }),
  ],
});

export const limbGirths = defineExtractFile({
  name: 'limb_girths',
  about: 'One row for each girth of each trial of a complete assessment',
  table: 'limb_trial',
  joins: `join limb_assessment a on a.id = r.assessment_id join visit v on v.id = a.visit_id join ${visitPlace} place on place.id = a.visit_id
    cross join lateral unnest(r.circumferences_mm) with ordinality as girth(mm, level)`,
  on: 'v.done_on',
  where: `a.state = 'complete'`,
  order: 'place.number, r.side, r.trial, girth.level',
  columns: [
    ofVisit,
    code('side', arms, { label: 'Arm', from: 'limb_trial.side' }),
    integer('trial', { label: 'Trial', from: 'limb_trial.trial' }),
    integer('level', { label: 'Level, counted upward from the wrist', from: 'limb_trial.circumferences_mm', sql: 'girth.level' }),
    integer('above_wrist_mm', { label: 'Distance of the level from the wrist', from: 'limb_assessment.step_mm', unit: 'mm', sql: 'a.start_offset_mm + (girth.level - 1) * a.step_mm' }),
    integer('circumference_mm', { label: 'Circumference', from: 'limb_trial.circumferences_mm', unit: 'mm', sql: 'girth.mm' }),
  ],
});
