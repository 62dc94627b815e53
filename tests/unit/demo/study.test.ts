import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import { windowGaps } from '@/instruments/calendar';
import { isParticipantCode } from '@/instruments/participant-code';
import { findQuestionnaire } from '@/instruments/questionnaires';
import { validateAnswers } from '@/instruments/questionnaires/validate';
import { consentForm } from '@/scripts/demo/consent-form';
import { finalRows, type DemoEvent, type Row } from '@/scripts/demo/events';
import { people, studyEvents } from '@/scripts/demo/generate';
import { type Life } from '@/scripts/demo/participant-life';
import { layOut, type Plan } from '@/scripts/demo/plan';
import { protocolDocument } from '@/scripts/demo/protocol';
import { demoDefaults } from '@/scripts/demo/seed-study';

const now = new Date('2027-03-03T10:40:00Z');
const planOf = (participants: number, seed: number = demoDefaults.seed): Plan => layOut({ seed, now, participants, logWeeks: 200 });
const eventsOf = (plan: Plan): DemoEvent[] => [...studyEvents(plan), ...[...people(plan)].flatMap(({ events }) => events)];
const checksum = (events: readonly DemoEvent[]): string => createHash('sha256').update(JSON.stringify([...finalRows(events)])).digest('hex');

let plan: Plan;
let lives: Life[];
let events: DemoEvent[];
let tables: Map<string, Row[]>;
const rows = (table: string): Row[] => tables.get(table) ?? [];

beforeAll(() => {
  plan = planOf(demoDefaults.participants);
  const all = [...people(plan)];
  lives = all.flatMap(({ life }) => (life ? [life] : []));
  events = [...studyEvents(plan), ...all.flatMap(({ events: own }) => own)];
  tables = finalRows(events);
}, 240_000);

describe('the generator', () => {
  test('tells the same study twice from one seed, and another from another', () => {
    const first = checksum(eventsOf(planOf(40)));
    expect(checksum(eventsOf(planOf(40)))).toBe(first);
    expect(checksum(eventsOf(planOf(40, 21)))).not.toBe(first);
  }, 120_000);

  test('writes nothing that is still to come', () => {
    expect(events.filter(({ at }) => at > now).map(({ act, at }) => [act, at])).toEqual([]);
  });

  test('gives each participant one code whose check character is right, and addresses that lead nowhere', () => {
    const codes = rows('participant').map(({ code }) => String(code));
    expect(codes).toHaveLength(demoDefaults.participants);
    expect(new Set(codes).size).toBe(codes.length);
    expect(codes.filter((code) => !isParticipantCode(code))).toEqual([]);
    const addresses = [...rows('participant_identity'), ...rows('credential'), ...rows('site')].map(({ email }) => String(email));
    expect(addresses.filter((address) => !address.endsWith('.example'))).toEqual([]);
  });

  test('lets nobody be enrolled before consent is complete, nor anything be recorded before enrolment', () => {
    for (const { events: own, person } of lives) {
      const first = (act: string): number => Math.min(...own.filter((event) => event.act === act).map(({ at }) => at.getTime()));
      expect(first('consent.countersign'), person.code).toBeLessThan(first('participant.enrol'));
      const recorded = own.filter(({ act }) => /^(visit|assessment|training|questionnaire|symptom)\./.test(act));
      expect(Math.min(Infinity, ...recorded.map(({ at }) => at.getTime())), person.code).toBeGreaterThan(first('participant.enrol'));
    }
  });

  test('hands in only answers that the questionnaire itself accepts', () => {
    const submitted = rows('questionnaire_response').filter(({ state }) => state === 'submitted');
    expect(submitted.length).toBeGreaterThan(500);
    for (const { instrument, answers } of submitted.filter((_, index) => index % 7 === 0)) {
      const questionnaire = findQuestionnaire(String(instrument));
      expect(questionnaire && validateAnswers(questionnaire, answers)).toEqual({ ok: true, data: answers });
    }
  });
});

describe('the study', () => {
  test('has windows that never overlap', () => {
    const { gapsDays, overlap } = windowGaps(protocolDocument.visits.map(({ offsetDays, earlyDays, lateDays }) => ({ offsetDays, beforeDays: earlyDays, afterDays: lateDays })));
    expect(overlap, gapsDays.join(' ')).toBe(false);
  });

  test('keeps the training rules for the most part, and breaks each kind now and then', () => {
    const flags = lives.flatMap(({ flags: own }) => own);
    const sessions = lives.flatMap(({ sessions: own }) => own);
    expect(sessions.length).toBeGreaterThan(5000);
    expect(new Set(flags.map(({ sessionId }) => sessionId)).size / sessions.length).toBeLessThan(0.06);
    for (const rule of ['STEP_OVER', 'STEP_HARD', 'RAISED_WITHIN_WEEK', 'ASSESSMENT_REQUIRED', 'RESUME_HIGH']) expect(flags.some((flag) => flag.rule === rule), rule).toBe(true);
    const late = sessions.filter((session) => session.late).length / sessions.length;
    expect(late).toBeGreaterThan(0.005);
    expect(late).toBeLessThan(0.1);
  });

  test('shows the work of a site in every state', () => {
    const states = (table: string): string[] => [...new Set(rows(table).map(({ state }) => String(state)))].sort();
    expect(states('data_query')).toEqual(['answered', 'cancelled', 'closed', 'open']);
    expect(states('symptom_report')).toEqual(['new', 'read', 'reviewed']);
    expect(states('screening')).toEqual(['enrolled', 'not enrolled', 'screening']);
    expect(states('visit')).toEqual(['complete', 'in progress', 'missed', 'to come']);
    expect(states('consent')).toEqual(['complete', 'reading', 'signed by participant']);
    expect(states('participant')).toEqual(['completed', 'enrolled', 'withdrawn']);
    expect(new Set(rows('participant').map(({ left_grade }) => left_grade ?? null)).size).toBe(4);
  });

  test('opens on an urgent report at Northmoor within the last hours, unread, with its clock running', () => {
    const urgent = rows('symptom_report').filter(({ level, state }) => level === 'R1' && state === 'new');
    expect(urgent).toHaveLength(1);
    expect(urgent[0]).toMatchObject({ site_id: plan.sites[0]?.id, hold_training: true });
    expect(now.getTime() - Date.parse(String(urgent[0]?.['reported_at']))).toBeLessThan(4 * 3_600_000);
    expect(Date.parse(String(urgent[0]?.['due_at']))).toBeGreaterThan(now.getTime());
  });

  test('gives both demo participants something to do this week', () => {
    const signedIn = lives.filter(({ person }) => person.cast?.signIn);
    expect(signedIn).toHaveLength(2);
    for (const { person, visits } of signedIn) expect(visits.some(({ outcome }) => outcome.kind === 'under way' || outcome.kind === 'booked'), person.code).toBe(true);
  });

  test('is told in whole at 40 participants and at 3', () => {
    expect(finalRows(eventsOf(planOf(40))).get('participant')).toHaveLength(40);
    expect(finalRows(eventsOf(planOf(3))).get('participant')).toHaveLength(3);
  }, 120_000);
});

/** Syllables by the count of vowel groups, a silent final e taken off: rough, and rough in the same way for every text. */
const syllables = (word: string): number => Math.max(1, (word.toLowerCase().replace(/(?:[^laeiouy]es|ed|[^laeiouy]e)$/, '').match(/[aeiouy]+/g) ?? []).length);

/** Flesch-Kincaid grade, 0.39 words/sentences + 11.8 syllables/words - 15.59 (Kincaid 1975; constants from memory). */
function gradeOf(text: string): number {
  const sentences = text.split(/[.:!?]+\s/).filter((part) => part.trim() !== '');
  const words = text.match(/[A-Za-z']+/g) ?? [];
  const sum = words.reduce((total, word) => total + syllables(word), 0);
  return (0.39 * words.length) / sentences.length + (11.8 * sum) / words.length - 15.59;
}

describe('the consent form', () => {
  test('has seven parts, and asks three permissions', () => {
    expect(consentForm.sections).toHaveLength(7);
    expect(consentForm.permissions.map(({ key }) => key)).toEqual(['future-contact', 'data-sharing', 'linkage']);
  });

  test.each(consentForm.sections.map(({ title, paragraphs }) => [title, paragraphs.join(' ')] as const))('‘%s’ reads at grade 8 or below', (_title, text) => {
    expect(gradeOf(text)).toBeLessThanOrEqual(8);
  });
});
