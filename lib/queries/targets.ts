import { may } from '@/lib/auth/policy';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** The values a query or a mark can stand beside: table and column, in words. A closed list, so that no name reaches SQL unasked. */
export const targetTables = ['visit', 'limb_assessment', 'limb_trial', 'questionnaire_response', 'participant'] as const;
export type TargetTable = (typeof targetTables)[number];

const labels: Record<TargetTable, Readonly<Record<string, string>>> = {
  visit: { done_on: 'Date of visit', missed_reason: 'Reason for the missed visit' },
  limb_assessment: {
    measured_at: 'Time of measuring',
    position: 'Position of the arm',
    sleeve_worn: 'Sleeve worn in the last 12 hours',
    hours_since_training: 'Hours since last training',
    body_weight_g: 'Body weight',
    impedance_ratio: 'Impedance ratio',
    impedance_rest_min: 'Lying down for',
    remarks: 'Remarks',
  },
  limb_trial: {},
  questionnaire_response: {},
  participant: {
    affected_side: 'Affected side',
    dominant_side: 'Dominant hand',
    surgery_on: 'Date of surgery',
    surgery: 'Surgery',
    axillary_procedure: 'Axillary procedure',
    nodes_removed: 'Nodes removed',
    radiotherapy: 'Radiotherapy',
    systemic_therapy: 'Systemic therapy',
    height_mm: 'Height',
    age_years: 'Age at enrolment',
  },
};

/** Which value: a row and a column of it, or one element ('circumferences_mm.5', 'answers.reach'). */
export interface FieldTarget {
  readonly table: TargetTable;
  readonly id: string;
  readonly field: string;
}

/** A value as it stands now, with where it belongs. */
export interface FoundTarget extends FieldTarget {
  readonly siteId: string;
  readonly participantId: string;
  readonly visitId: string | null;
  readonly label: string;
  readonly value: unknown;
}

const levelLabel = (image: Record<string, unknown>, level: number, assessment: { step_mm: number; start_offset_mm: number }): string =>
  `${image['side'] === 'left' ? 'Left' : 'Right'} arm at ${(assessment.start_offset_mm + level * assessment.step_mm) / 10} cm, trial ${String(image['trial'])}`;

async function labelOf(work: Work, { table, field }: FieldTarget, image: Record<string, unknown>): Promise<string | null> {
  const level = /^circumferences_mm\.(\d{1,2})$/.exec(field);
  if (table === 'limb_trial' && level) {
    const [assessment] = await work.sql<{ step_mm: number; start_offset_mm: number; level_count: number }>(
      'select step_mm, start_offset_mm, level_count from limb_assessment where id = ?',
      [image['assessment_id']],
    );
    return assessment && Number(level[1]) < assessment.level_count ? levelLabel(image, Number(level[1]), assessment) : null;
  }
  if (table === 'questionnaire_response') {
    const item = /^answers\.([\w-]{1,60})$/.exec(field)?.[1];
    return item && Object.hasOwn(image['answers'] as Record<string, unknown>, item) ? `Answer to ${item}` : null;
  }
  return Object.hasOwn(labels[table], field) ? (labels[table][field] ?? null) : null;
}

async function isStillOpen(work: Work, table: TargetTable, image: Record<string, unknown>): Promise<boolean> {
  if (table === 'limb_assessment') return image['state'] === 'open';
  if (table === 'questionnaire_response') return image['state'] === 'in progress';
  if (table !== 'limb_trial') return false;
  const [open] = await work.sql("select id from limb_assessment where id = ? and state = 'open'", [image['assessment_id']]);
  return open !== undefined;
}

const isDictionary = (part: unknown): part is Record<string, unknown> => typeof part === 'object' && part !== null;

/**
 * The value behind a target, within reach.
 * @throws Refusal 'not-found' when the row is out of reach or has no such field.
 */
export async function findTarget(work: Work, target: FieldTarget): Promise<FoundTarget> {
  const absent = new Refusal('not-found', 'There is no such value in your reach.');
  if (!targetTables.includes(target.table)) throw absent;
  const [row] = await work.sql<{ image: Record<string, unknown>; visit_id: string | null }>(
    `select to_jsonb(t) as image, ${visitOf[target.table]} as visit_id from ${target.table} t where t.id = ?`,
    [target.id],
  );
  // What is still being taken is the site's alone: nobody else asks about it, marks it or reads its history.
  if (row && (await isStillOpen(work, target.table, row.image)) && !may(work.actor.role, 'query.answer')) throw absent;
  const label = row && (await labelOf(work, target, row.image));
  if (!row || !label) throw absent;
  const { image, visit_id: visitId } = row;
  const value = target.field.split('.').reduce<unknown>((part, key) => (isDictionary(part) && Object.hasOwn(part, key) ? part[key] : null), image);
  return { ...target, siteId: String(image['site_id']), participantId: String(image['participant_id'] ?? image['id']), visitId, label, value: value ?? null };
}

const visitOf: Record<TargetTable, string> = {
  visit: 't.id',
  limb_assessment: 't.visit_id',
  limb_trial: '(select visit_id from limb_assessment a where a.id = t.assessment_id)',
  questionnaire_response: 't.visit_id',
  participant: 'null::uuid',
};
