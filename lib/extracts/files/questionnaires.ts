import { questionnaires } from '@/instruments/questionnaires';
import { elementsOf } from '@/instruments/questionnaires/define-questionnaire';
import { LEFT_OUT, NOT_TRIED } from '@/instruments/questionnaires/items';
import { atSite, code, day, defineExtractFile, integer, key, number, scheduleDay, type ExtractColumn } from '../define-extract-file';
import { visitPlace } from './limbs';

/** Questions with offered answers. Answers in words are never read. */
const items = questionnaires.flatMap(({ key: instrument, version, survey }) =>
  elementsOf(survey).flatMap((element) => (element.type === 'radiogroup' ? [{ instrument, version, item: element.name, choices: element.choices }] : [])),
);
const scales = questionnaires.flatMap(({ key: instrument, version, scales: list }) => list.map(({ code: scale }) => ({ instrument, version, scale })));

/** Names of our own registry; a quote in one would be a mistake of ours, and is refused. */
const quoted = (name: string | number): string => {
  if (!/^[a-z0-9.-]+$/i.test(String(name))) throw new RangeError(`A name of the registry holds more than letters, digits and dashes: ${name}.`);
  return `'${name}'`;
};
const itemRows = items.map(({ instrument, version, item }) => `(${quoted(instrument)}, ${version}, ${quoted(item)})`).join(', ');
const scaleRows = scales.map(({ instrument, version, scale }) => `(${quoted(instrument)}, ${version}, ${quoted(scale)})`).join(', ');

const numbers = [...new Set(items.flatMap(({ choices }) => choices.map(({ value }) => value)))].filter((value) => typeof value === 'number').map(String);
const unique = (names: readonly string[]) => [...new Set(names)];
const answer = `r.answers ->> ask.item`;

const response: ExtractColumn[] = [
  { name: 'visit_number', label: 'Visit, as numbered in visits', from: ['visit.target_on'], kind: 'integer', sql: 'place.number' },
  code('questionnaire', unique(items.map(({ instrument }) => instrument)), { label: 'Questionnaire', from: 'questionnaire_response.instrument' }),
  integer('questionnaire_version', { label: 'Version of the questionnaire', from: 'questionnaire_response.instrument_version' }),
  scheduleDay('due_day', { label: 'Day due', from: 'questionnaire_response.due_on' }),
  day('submitted_day', { label: 'Day of submitting', from: 'questionnaire_response.submitted_at', moment: true }),
];
const joins = (rows: string, name: string) => `left join ${visitPlace} place on place.id = r.visit_id
  join (values ${rows}) as ask(instrument, version, ${name}) on ask.instrument = r.instrument and ask.version = r.instrument_version`;
const submitted = { table: 'questionnaire_response', on: atSite('r.submitted_at'), where: `r.state = 'submitted'` } as const;

export const questionnaireItems = defineExtractFile({
  ...submitted,
  name: 'questionnaire_items',
  about: 'One row for each question of a submitted questionnaire, answered or not',
  joins: joins(itemRows, 'item'),
  order: 'r.due_on, r.instrument, ask.item',
  columns: [
    ...response,
    code('item', unique(items.map(({ item }) => item)), { label: 'Question', from: 'questionnaire_response.answers', sql: 'ask.item' }),
    code('answer', numbers, { label: 'Answer as its number', from: 'questionnaire_response.answers', sql: `case when jsonb_typeof(r.answers -> ask.item) = 'number' then ${answer} end` }),
    code('no_answer', ['left out', 'not tried', 'not reached'], {
      label: 'Why there is no number',
      from: 'questionnaire_response.left_out',
      sql: `case when ${answer} = '${LEFT_OUT}' or ask.item = any (r.left_out) then 'left out' when ${answer} = '${NOT_TRIED}' then 'not tried' when ${answer} is null then 'not reached' end`,
    }),
  ],
});

export const questionnaireScores = defineExtractFile({
  ...submitted,
  name: 'questionnaire_scores',
  about: 'One row for each scale of a submitted questionnaire',
  joins: joins(scaleRows, 'scale'),
  order: 'r.due_on, r.instrument, ask.scale',
  columns: [
    ...response,
    key('scale', { label: 'Scale', from: 'questionnaire_response.scores', sql: 'ask.scale' }),
    number('score', { label: 'Score from 0 to 100; empty where too few questions were answered', from: 'questionnaire_response.scores', sql: `case when jsonb_typeof(r.scores -> ask.scale) = 'number' then r.scores ->> ask.scale end` }),
  ],
});
