import { reportedSigns } from '@/instruments/safety/symptom-report';
import { atSite, code, day, defineExtractFile, integer, yesOrNo, type ExtractColumn } from '../define-extract-file';

const reportPlace = '(select id, row_number() over (partition by participant_id order by reported_at, id)::int as number from symptom_report)';
const from = 'symptom_report.answers';

const signs: ExtractColumn[] = reportedSigns.map(({ code: sign, text }) =>
  yesOrNo(`sign_${sign.replaceAll('-', '_')}`, { label: `Reported: ${text}`, from, sql: `r.answers -> 'signs' @> '["${sign}"]'::jsonb` }),
);

export const symptomReports = defineExtractFile({
  name: 'symptom_reports',
  about: 'One row for each symptom report, without anybody’s own words',
  table: 'symptom_report',
  joins: `join ${reportPlace} place on place.id = r.id`,
  on: atSite('r.reported_at'),
  order: 'place.number',
  columns: [
    { name: 'report_number', label: 'Number of the report within the person', from: ['symptom_report.reported_at'], kind: 'integer', sql: 'place.number' },
    day('reported_day', { label: 'Day of the report', from: 'symptom_report.reported_at', moment: true }),
    day('noticed_day', { label: 'Day it was noticed', from: 'symptom_report.noticed_on' }),
    code('level', ['S0', 'S1', 'S2', 'S3', 'R1', 'R1+', 'R2', 'R3', 'R4'], { label: 'Level of the report', from: 'symptom_report.level' }),
    ...signs,
    code('arm_check', ['the same', 'a little fuller', 'clearly fuller', 'not sure'], { label: 'Arm check before training, where the report came from it', from, sql: `r.answers ->> 'armCheck'` }),
    yesOrNo('lasted_over_a_day', { label: 'The change lasted over a day', from, sql: `r.answers -> 'lastedOverADay'` }),
    integer('sore_days', { label: 'Days of soreness after training', from, unit: 'd', sql: `case when jsonb_typeof(r.answers #> '{soreness,days}') = 'number' then (r.answers #>> '{soreness,days}')::numeric end` }),
    yesOrNo('sore_in_trained_muscles_only', { label: 'Sore in the trained muscles only', from, sql: `r.answers #> '{soreness,onlyTrainedMuscles}'` }),
    yesOrNo('training_held', { label: 'Training held until reviewed', from: 'symptom_report.hold_training' }),
    code('state', ['new', 'read', 'reviewed'], { label: 'State of the review', from: 'symptom_report.state' }),
    day('reviewed_day', { label: 'Day of the review', from: 'symptom_report.reviewed_at', moment: true }),
    code('outcome', ['no action', 'advice', 'unscheduled visit', 'adverse event'], { label: 'Outcome of the review', from: 'symptom_report.outcome' }),
  ],
});
