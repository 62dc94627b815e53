import type { ConsentForm, ProtocolDocument } from '@/lib/protocol/document';

/** A small protocol: three visits, the three questionnaires, the primary swelling definition. */
export const smallProtocol: ProtocolDocument = {
  cohorts: [
    { key: 'at-risk', name: 'At risk of swelling' },
    { key: 'living-with', name: 'Living with swelling' },
  ],
  daysSinceSurgery: 28,
  eligibility: [
    { key: 'adult', text: 'Is 18 years or older', lets: 'yes' },
    { key: 'treated', text: 'Had surgery for breast cancer on one side', lets: 'yes' },
    { key: 'metastases', text: 'Has distant metastases', lets: 'no' },
  ],
  anchor: 'enrolment',
  visits: [
    { key: 'baseline', name: 'Baseline', offsetDays: 0, earlyDays: 0, lateDays: 28, questionnaires: ['arm-symptoms', 'daily-tasks', 'lifting-confidence'] },
    { key: 'week-12', name: 'Week 12', offsetDays: 84, earlyDays: 14, lateDays: 14, questionnaires: ['arm-symptoms'] },
    { key: 'month-6', name: 'Month 6', offsetDays: 182, earlyDays: 21, lateDays: 21, questionnaires: ['arm-symptoms', 'daily-tasks', 'lifting-confidence'] },
  ],
  measurement: { method: 'frustum', startOffsetMm: 0, stepMm: 40, levelCount: 11, toleranceMm: 5, position: 'seated, arm supported at shoulder height', semPct: 1.5 },
  swelling: { primary: 'D1', alternatives: ['D2'], earlyExclusionDays: 90, impedanceCutoffs: '2011-3sd' },
  training: {
    startKg: 2, startFromKg: 1, weeklyStepKg: 2, jumpKg: 5, breakDays: 28, resumeFromFraction: 0.5, resumeToFraction: 0.8,
    toleranceKg: 0, incrementKg: 0.5, shortBreakDays: null, minDaysSinceRaise: null, minSessionsAtLoad: null,
  },
  exercises: ['chest-press', 'seated-row', 'biceps-curl', 'leg-press'],
  sessionsPerWeek: 2,
  lateAfterHours: 48,
  queryDueDays: 14,
};

/** A consent form in two parts, with two statements and two permissions. */
export const smallConsentForm: ConsentForm = {
  title: 'Taking part in Steady Lift',
  sections: [
    { key: 'key-facts', title: 'The main points', paragraphs: ['You choose. Your care stays the same.'] },
    { key: 'what-we-ask', title: 'What we ask of you', paragraphs: ['You lift twice a week and write down what you lifted.'] },
  ],
  statements: [
    { key: 'read', text: 'I have read every part and my questions were answered.' },
    { key: 'free', text: 'I may stop at any time, without a reason and without any change in my care.' },
  ],
  permissions: [
    { key: 'data-sharing', text: 'My data, without my name, may be shared with researchers the study approves.' },
    { key: 'future-contact', text: 'The site may ask me about later studies.' },
  ],
};
