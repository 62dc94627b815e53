import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { FieldTarget } from '@/lib/queries/targets';
import type { ReviewView } from '@/lib/review/view-review';
import { formatDate, formatNumber } from '../ui/format';

/** What a value is, which says how it is printed and how it is corrected. */
export type ValueKind = 'date' | 'position' | 'worn' | 'hours' | 'weight' | 'girth' | 'ratio' | 'minutes' | 'words';

/** One value of the form: where it stands in the record, and its row's version for a change. */
export interface ReviewItem {
  readonly key: string;
  readonly target: FieldTarget;
  /** 'Left arm at 24 cm, trial 2'. */
  readonly label: string;
  readonly kind: ValueKind;
  /** The arm, of a reading of the tape. */
  readonly side?: 'left' | 'right';
  readonly value: string | number | boolean | null;
  readonly version: number;
}

/** One line of the form. A line of the tape holds several values; others hold one. */
export interface ReviewRow {
  readonly key: string;
  readonly no: string;
  readonly label: string;
  readonly items: readonly ReviewItem[];
}

/** One numbered part of the form. */
export interface ReviewPart {
  readonly no: string;
  readonly title: string;
  readonly tape: boolean;
  readonly rows: readonly ReviewRow[];
}

export const keyOfTarget = ({ table, id, field }: { table: string; id: string; field: string }): string => `${table} ${id} ${field}`;

/** Id of the element that holds a value: what its notes are tied to. */
export const anchorOf = (key: string): string => `at-${key.replaceAll(/[ .]/g, '-')}`;

const unitOf: Partial<Record<ValueKind, string>> = { hours: 'h', weight: 'kg', girth: 'cm', minutes: 'min' };
export const unitOfKind = (kind: ValueKind): string => unitOf[kind] ?? '';

/** A value as it is printed, without its unit. */
export function printBare(kind: ValueKind, value: unknown): string {
  if (value === null || value === undefined || value === '') return 'not recorded';
  if (kind === 'date') return formatDate(String(value));
  if (kind === 'worn') return value === true ? 'Worn' : 'Not worn';
  if (kind === 'weight') return formatNumber(Number(value) / 1000, 1);
  if (kind === 'girth') return formatNumber(Number(value) / 10, 1);
  if (kind === 'ratio') return formatNumber(Number(value), 3);
  return String(value);
}

/** A value as it is printed, with its unit. */
export function printValue(kind: ValueKind, value: unknown): string {
  const bare = printBare(kind, value);
  return bare === 'not recorded' ? bare : [bare, unitOf[kind]].filter(Boolean).join(' ');
}

function single(no: string, label: string, kind: ValueKind, target: FieldTarget, value: ReviewItem['value'], version: number): ReviewRow {
  const key = keyOfTarget(target);
  return { key, no, label, items: [{ key, target, label, kind, value, version }] };
}

function tapeRows({ map, trials, trialIds }: CompleteAssessmentView): ReviewRow[] {
  const columns = trialIds.toSorted((a, b) => a.side.localeCompare(b.side) || a.trial - b.trial);
  return Array.from({ length: map.levelCount }, (_, level) => {
    const cm = formatNumber((map.startOffsetMm + level * map.stepMm) / 10, 0);
    const items = columns.flatMap(({ id, side, trial, version }) => {
      const value = trials.find((row) => row.side === side && row.trial === trial)?.circumferencesMm[level] ?? null;
      const target: FieldTarget = { table: 'limb_trial', id, field: `circumferences_mm.${level}` };
      const label = `${side === 'left' ? 'Left' : 'Right'} arm at ${cm} cm, trial ${trial}`;
      return value === null ? [] : [{ key: keyOfTarget(target), target, label, kind: 'girth' as const, side, value, version }];
    });
    return { key: `tape ${level}`, no: `2.${level + 1}`, label: cm, items };
  });
}

/** The value of a line that answers to the one that is chosen: on the same arm, where the line has both. */
export const itemLike = ({ items }: ReviewRow, side: ReviewItem['side']): ReviewItem | undefined => items.find((item) => item.side === side) ?? items[0];

/** The form of a visit, part by part, in the order in which it was taken. */
export function partsOfReview({ visit, assessment }: Pick<ReviewView, 'visit' | 'assessment'>): ReviewPart[] {
  const date = single('1.1', 'Date of visit', 'date', { table: 'visit', id: visit.id, field: 'done_on' }, visit.doneOn, visit.version);
  if (!assessment) return visit.doneOn ? [{ no: '1', title: 'The visit', tape: false, rows: [date] }] : [];
  const { circumstances: about, id, version } = assessment;
  const of = (no: string, label: string, kind: ValueKind, field: string, value: ReviewItem['value']) => single(no, label, kind, { table: 'limb_assessment', id, field }, value, version);
  return [
    {
      no: '1',
      title: 'Before measuring',
      tape: false,
      rows: [
        date,
        of('1.2', 'Position of the arms', 'position', 'position', about.position),
        of('1.3', 'Sleeve worn in the last 12 hours', 'worn', 'sleeve_worn', about.sleeveWorn),
        of('1.4', 'Hours since last training', 'hours', 'hours_since_training', about.hoursSinceTraining),
        of('1.5', 'Body weight', 'weight', 'body_weight_g', about.bodyWeightG),
      ],
    },
    { no: '2', title: 'Tape, girths in cm', tape: true, rows: tapeRows(assessment) },
    {
      no: '3',
      title: 'Bioimpedance',
      tape: false,
      rows: [
        of('3.1', 'Ratio, unaffected over at risk', 'ratio', 'impedance_ratio', about.impedanceRatio),
        of('3.2', 'Lying down for', 'minutes', 'impedance_rest_min', about.impedanceRestMin),
      ],
    },
    { no: '4', title: 'In words', tape: false, rows: [of('4.1', 'Remarks', 'words', 'remarks', about.remarks)] },
  ];
}

/** Where a finding of the saved form stands: the value it is about, or the first of the tape for a whole arm. */
export function keyOfPlace(place: string, { trialIds, id }: CompleteAssessmentView): string {
  const cell = /^(left|right) ([123]) (\d+)$/.exec(place);
  const of = (field: string) => keyOfTarget({ table: 'limb_assessment', id, field });
  if (place === 'weight') return of('body_weight_g');
  if (place === 'ratio') return of('impedance_ratio');
  const trial = trialIds.find(({ side, trial: number }) => (cell ? side === cell[1] && number === Number(cell[2]) : true));
  return keyOfTarget({ table: 'limb_trial', id: trial?.id ?? '', field: `circumferences_mm.${cell?.[3] ?? 0}` });
}

/** Lines whose every value was seen at source, out of all lines that hold one. */
export function countSeen(parts: readonly ReviewPart[], marked: ReadonlySet<string>): { seen: number; of: number } {
  const rows = parts.flatMap(({ rows: all }) => all).filter(({ items }) => items.length > 0);
  return { seen: rows.filter((row) => isSeen(row, marked)).length, of: rows.length };
}

export const isSeen = ({ items }: ReviewRow, marked: ReadonlySet<string>): boolean => items.every(({ key }) => marked.has(key));
