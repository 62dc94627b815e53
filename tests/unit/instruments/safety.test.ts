import { describe, expect, test } from 'vitest';
import { judgeArmCheck } from '@/instruments/safety/judge-arm-check';
import { judgeMeasurement } from '@/instruments/safety/judge-measurement';
import { judgeSymptomReport, safetyLevels, safetyVerdict } from '@/instruments/safety/judge-symptom-report';
import { type ReportedSign, reportedSigns, type SymptomReportAnswers } from '@/instruments/safety/symptom-report';

const report = (signs: ReportedSign[], over: Partial<SymptomReportAnswers> = {}) => judgeSymptomReport({ signs, lastedOverADay: null, soreness: null, ...over });

describe('a symptom report', () => {
  test('takes the gravest sign, whatever else is said', () => {
    expect(report(['heavy', 'hot', 'shaking'])?.level).toBe('R1+');
    expect(report(['heavy', 'red', 'breathless'])?.level).toBe('R3');
    expect(report(['red', 'blue'])?.level).toBe('R2');
    expect(report(['sudden-swelling'])?.level).toBe('R2');
    expect(report(['red', 'lump'])?.level).toBe('R1');
    expect(report(['lump', 'heavy'])?.level).toBe('R4');
  });

  test('a hot or red arm is urgent with or without fever', () => {
    expect(report(['hot'])).toMatchObject({ level: 'R1', urgency: 'same-day care', holdTraining: true });
    expect(report(['hot', 'fever'])?.level).toBe('R1');
  });

  test('a change that lasts, or was not said to pass, holds training and starts the clock', () => {
    expect(report(['heavy'], { lastedOverADay: true })).toMatchObject({ level: 'S1', holdTraining: true, siteDeadline: { workingDays: 1 }, measureWithin: { days: 7 } });
    expect(report(['heavy'])?.level).toBe('S1');
    expect(report(['heavy'], { lastedOverADay: false })).toMatchObject({ level: 'S0', holdTraining: false, siteDeadline: null });
  });

  test('three symptoms or visible swelling are measured within 3 days', () => {
    expect(report(['heavy', 'tight', 'full'])?.measureWithin).toEqual({ days: 3 });
    expect(report(['visible-swelling'], { lastedOverADay: false })).toMatchObject({ level: 'S1', measureWithin: { days: 3 } });
  });

  test('soreness is soreness for 7 days in the trained muscles, then a change', () => {
    expect(report([], { soreness: { days: 7, onlyTrainedMuscles: true } })?.level).toBe('S0');
    expect(report([], { soreness: { days: 8, onlyTrainedMuscles: true } })?.level).toBe('S1');
    expect(report([], { soreness: { days: 2, onlyTrainedMuscles: false } })?.level).toBe('S1');
    expect(report([])).toBeNull();
  });

  test('every sign leads to a level, and every red one to urgent words at once', () => {
    for (const { code, group } of reportedSigns) {
      const verdict = report([code]);
      expect(verdict).not.toBeNull();
      if (group !== 'change' && group !== 'new finding') {
        expect(verdict?.urgency).toMatch(/emergency now|same-day care/);
        expect(verdict?.participantText).toContain('Nobody reads reports around the clock');
        expect(verdict?.holdTraining).toBe(true);
      }
    }
    expect(() => report(['unheard-of' as ReportedSign])).toThrow(RangeError);
  });

  test('no level names a diagnosis as certain, and all defer to clinicians or local codes', () => {
    for (const level of safetyLevels) {
      const { participantText, participantTitle } = safetyVerdict(level);
      expect(`${participantTitle} ${participantText}`).not.toMatch(/you have (an infection|a clot|lymph)/i);
      expect(participantText.length).toBeGreaterThan(40);
    }
    expect(safetyVerdict('R3').participantTitle).toContain('local emergency number');
  });
});

describe('the arm check and the measurement', () => {
  test('a change at the arm check holds training; not sure does not', () => {
    expect(judgeArmCheck('a-little')?.level).toBe('S1');
    expect(judgeArmCheck('clearly')?.measureWithin).toEqual({ days: 3 });
    expect([judgeArmCheck('same'), judgeArmCheck('not-sure'), judgeArmCheck(null)]).toEqual([null, null, null]);
  });

  test('the lines of S2 and S3 are met exactly', () => {
    const measured = { rvcPct: 0, rvcSinceLastVisitPoints: null, isImpedanceAboveCutoff: null, ctcaeGrade: null };
    const level = (over: Partial<typeof measured> | Record<string, unknown>) => judgeMeasurement({ ...measured, ...over })?.level;
    expect([level({ rvcPct: 4.99 }), level({ rvcPct: 5 }), level({ rvcPct: 9.99 }), level({ rvcPct: 10 })]).toEqual([undefined, 'S2', 'S2', 'S3']);
    expect([level({ rvcSinceLastVisitPoints: 5 }), level({ ctcaeGrade: 2 }), level({ isImpedanceAboveCutoff: true })]).toEqual(['S3', 'S3', 'S2']);
    expect(level({ rvcPct: null })).toBeUndefined();
  });
});
