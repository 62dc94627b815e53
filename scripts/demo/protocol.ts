import { defaultTrainingSettings } from '@/instruments/training/settings';
import { protocolSchema, type ProtocolDocument } from '@/lib/protocol/document';

const every = ['arm-symptoms', 'daily-tasks', 'lifting-confidence'];
const visit = (key: string, name: string, offsetDays: number, halfWidthDays: number, questionnaires: readonly string[] = every) => ({
  key, name, offsetDays, earlyDays: halfWidthDays, lateDays: halfWidthDays, questionnaires: [...questionnaires],
});

/**
 * Version 1.0 of the invented study 'Steady Lift'. Schedule and windows after the template of our own making for
 * people who train; the training rules are common practice without a source; tape error as trained therapists
 * reached it (scaled SEM of the arm 0.82 %: Tidhar 2015, J Pers Med 5:341).
 */
export const protocolDocument: ProtocolDocument = protocolSchema.parse({
  cohorts: [
    { key: 'at-risk', name: 'At risk of swelling' },
    { key: 'swelling', name: 'Living with swelling' },
  ],
  daysSinceSurgery: 28,
  eligibility: [
    { key: 'adult', text: 'Aged 18 or over', lets: 'yes' },
    { key: 'treated', text: 'Treated for breast cancer on one side', lets: 'yes' },
    { key: 'nodes', text: 'Lymph nodes removed, or radiotherapy to them, on that side', lets: 'yes' },
    { key: 'healed', text: 'Wounds healed, and four weeks or more since surgery', lets: 'yes' },
    { key: 'both-arms', text: 'Both arms can be measured', lets: 'yes' },
    { key: 'infection', text: 'Infection or clot in the arm during the past four weeks', lets: 'no' },
    { key: 'advised-against', text: 'Advised by a clinician not to lift weights', lets: 'no' },
    { key: 'other-side', text: 'Lymph nodes removed on the other side as well', lets: 'no' },
  ],
  anchor: 'enrolment',
  visits: [
    { ...visit('baseline', 'Baseline', 0, 0), lateDays: 14 },
    visit('month-3', 'Month 3', 91, 14),
    visit('month-6', 'Month 6', 183, 21),
    visit('month-9', 'Month 9', 274, 21, ['arm-symptoms']),
    visit('month-12', 'Month 12', 365, 28),
    visit('month-18', 'Month 18', 548, 28, ['arm-symptoms', 'lifting-confidence']),
    visit('month-24', 'Month 24', 730, 28),
  ],
  measurement: {
    method: 'frustum',
    startOffsetMm: 0,
    stepMm: 40,
    levelCount: 11,
    toleranceMm: 5,
    position: 'supported, 90° forward',
    semPct: 0.82,
  },
  swelling: { primary: 'D6', alternatives: ['D5', 'D3', 'D1', 'D2', 'D7'], earlyExclusionDays: 91, impedanceCutoffs: '2011-3sd' },
  training: { ...defaultTrainingSettings },
  exercises: ['chest-press', 'seated-row', 'biceps-curl'],
  sessionsPerWeek: 2,
  lateAfterHours: 72,
  queryDueDays: 14,
});
