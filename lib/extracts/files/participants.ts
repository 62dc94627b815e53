import { axillaryProcedures, radiotherapies, surgeries, systemicTherapies } from '@/lib/enrolment/input';
import { bandCodes, bands, code, defineExtractFile, key } from '../define-extract-file';

const values = (choices: readonly { readonly value: string }[]) => choices.map(({ value }) => value);
const sides = ['left', 'right'];

/** Age bands pool from 90 on: 45 CFR 164.514(b)(2)(i)(C). Widths are ours. */
const age = { open: bands('p.age_years', 10, 90), controlled: bands('p.age_years', 5, 90) };
const height = { open: bands('(p.height_mm / 10)', 10, 190), controlled: bands('(p.height_mm / 10)', 5, 190) };
const nodes = {
  open: `case when p.nodes_removed = 0 then '0' when p.nodes_removed <= 5 then '1-5' when p.nodes_removed <= 10 then '6-10' when p.nodes_removed > 10 then '11+' end`,
  controlled: `case when p.nodes_removed = 0 then '0' when p.nodes_removed <= 2 then '1-2' when p.nodes_removed <= 5 then '3-5' when p.nodes_removed <= 10 then '6-10' when p.nodes_removed <= 15 then '11-15' when p.nodes_removed > 15 then '16+' end`,
};
/** Whole weeks from one day to a later one. */
const weeks = (to: string, from: string, width: number): string => `case when ${to} >= ${from} then ${bands(`((${to} - ${from}) / 7)`, width, 104)} end`;
/** The day of surgery alone tells most people apart, so it leaves in bands only: half years, or quarters. Widths are ours. */
const sinceSurgery = { open: weeks('p.enrolled_on', 'p.surgery_on', 26), controlled: weeks('p.enrolled_on', 'p.surgery_on', 13) };

export const participants = defineExtractFile({
  name: 'participants',
  about: 'One row for each person',
  table: 'participant',
  on: 'p.enrolled_on',
  order: 'r.id',
  columns: [
    { ...key('site_number', { label: 'Site, numbered at random in this extract', from: 'participant.site_id', sql: 'person.site_number::text' }), only: 'controlled' },
    { name: 'age_band', label: 'Age at enrolment', from: ['participant.age_years'], kind: 'code', unit: 'years', codes: [...bandCodes(10, 10, 90), ...bandCodes(10, 5, 90).slice(0, -1)], sql: age },
    { name: 'height_band', label: 'Height', from: ['participant.height_mm'], kind: 'code', unit: 'cm', codes: [...bandCodes(120, 10, 190), ...bandCodes(120, 5, 190).slice(0, -1)], sql: height },
    key('cohort', { label: 'Cohort', from: 'participant.cohort' }),
    code('treated_side', sides, { label: 'Treated side', from: 'participant.affected_side' }),
    code('dominant_side', [...sides, 'both'], { label: 'Dominant hand', from: 'participant.dominant_side' }),
    { name: 'weeks_since_surgery_band', label: 'Time from surgery to enrolment', from: ['participant.surgery_on'], kind: 'code', unit: 'weeks', codes: [...bandCodes(0, 26, 104), ...bandCodes(0, 13, 104).slice(0, -1)], sql: sinceSurgery },
    code('surgery', values(surgeries), { label: 'Surgery', from: 'participant.surgery' }),
    code('axillary_procedure', values(axillaryProcedures), { label: 'Axillary procedure', from: 'participant.axillary_procedure' }),
    { name: 'nodes_removed_band', label: 'Nodes removed', from: ['participant.nodes_removed'], kind: 'code', codes: ['0', '1-2', '1-5', '3-5', '6-10', '11-15', '11+', '16+'], sql: nodes },
    code('radiotherapy', values(radiotherapies), { label: 'Radiotherapy', from: 'participant.radiotherapy' }),
    code('systemic_therapy', values(systemicTherapies), { label: 'Systemic therapy', from: 'participant.systemic_therapy' }),
    code('state', ['enrolled', 'withdrawn', 'completed'], { label: 'State in the study', from: 'participant.state' }),
    { name: 'left_weeks_band', label: 'Time from enrolment to leaving', from: ['participant.left_on'], kind: 'code', unit: 'weeks', codes: bandCodes(0, 13, 104), sql: weeks('p.left_on', 'p.enrolled_on', 13), only: 'controlled' },
    code('left_grade', ['stops training', 'no visits', 'no further data'], { label: 'What the person withdrew from', from: 'participant.left_grade' }),
    key('protocol', { label: 'Protocol version enrolled under', from: 'participant.protocol_version_id', sql: 'entry.number' }),
  ],
});
