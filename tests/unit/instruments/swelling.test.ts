import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { defaultSwellingContext, type SwellingAssessment } from '@/instruments/swelling/define-swelling';
import { judgeSwelling, swellingDefinition, swellingDefinitions } from '@/instruments/swelling/index';
import { excludeAround, excludeEarly, firstOccurrence, type JudgedVisit, sustained } from '@/instruments/swelling/occurrence';

function assessment(over: Partial<SwellingAssessment> & { atRiskMl?: number | null; unaffectedMl?: number | null } = {}): SwellingAssessment {
  const { atRiskMl = 2000, unaffectedMl = 2000, ...rest } = over;
  return {
    on: '2024-06-01',
    daysSinceSurgery: 200,
    atRisk: { volumeMl: atRiskMl, girthsMm: [160, 250] },
    unaffected: { volumeMl: unaffectedMl, girthsMm: [160, 250] },
    weightKg: 70,
    impedance: { atRiskOhm: 300, unaffectedOhm: 300 },
    reportedSymptoms: false,
    clinicianDiagnosed: false,
    ...rest,
  };
}

const judge = (code: Parameters<typeof swellingDefinition>[0], now: SwellingAssessment, baseline: SwellingAssessment | null = assessment(), over = {}) =>
  swellingDefinition(code).judge(now, baseline, { ...defaultSwellingContext, ...over });

describe('a definition of swelling', () => {
  test('meets its line exactly, where "or more" says so, and not where "more than" does', () => {
    expect(judge('D3', assessment({ atRiskMl: 2200 })).verdict).toBe('met');
    expect(judge('D4', assessment({ atRiskMl: 2200, unaffectedMl: 2200 })).verdict).toBe('met');
    expect(judge('D5', assessment({ atRiskMl: 2100 })).verdict).toBe('met');
    expect(judge('D6', assessment({ atRiskMl: 2200 })).verdict).toBe('met');
    expect(judge('D7', assessment({ atRiskMl: 2200 })).verdict).toBe('not met');
    expect(judge('D7', assessment({ atRiskMl: 2200.1 })).verdict).toBe('met');
    expect(judge('D9', assessment({ atRiskMl: 2100 })).verdict).toBe('met');
    expect(judge('D9', assessment({ atRiskMl: 2060 }), assessment(), { interLimbIncrease: { points: 3, bound: 'above' } }).verdict).toBe('not met');
    const wide = (mm: number) => assessment({ atRisk: { volumeMl: null, girthsMm: [160, mm] } });
    expect([judge('D1', wide(270)).verdict, judge('D1', wide(269.5)).verdict]).toEqual(['met', 'not met']);
    expect(judge('D2', wide(270), wide(251)).verdict).toBe('not met');
  });

  test('is not judged, with a reason, where something it needs is missing', () => {
    const bare = assessment({ atRiskMl: null, atRisk: { volumeMl: null, girthsMm: [] }, impedance: null, reportedSymptoms: null, clinicianDiagnosed: null });
    for (const verdict of judgeSwelling(bare, assessment())) {
      expect(verdict).toMatchObject({ verdict: 'not judged', value: null });
      expect(verdict.reason.length).toBeGreaterThan(5);
    }
  });

  test('that needs a baseline says so without one, and stays silent across methods', () => {
    const verdicts = judgeSwelling(assessment({ atRiskMl: 2600 }), null);
    const needing = swellingDefinitions.filter(({ needsBaseline }) => needsBaseline).map(({ code }) => code);
    expect(needing).toEqual(['D2', 'D4', 'D5', 'D6', 'D9']);
    for (const { code, verdict, reason } of verdicts) {
      if (needing.includes(code)) expect([verdict, reason]).toEqual(['not judged', 'There is no baseline to compare with.']);
      else expect(verdict).not.toBe('not judged');
    }
    expect(judge('D5', assessment({ atRiskMl: 2600 }), assessment(), { notComparable: 'Measured by another method.' }).reason).toBe('Measured by another method.');
    expect(judge('D3', assessment({ atRiskMl: 2600 }), assessment(), { notComparable: 'Measured by another method.' }).verdict).toBe('met');
  });

  test('D6 leaves out the first three months but still shows the number', () => {
    const early = (daysSinceSurgery: number | null) => judge('D6', assessment({ atRiskMl: 2300, daysSinceSurgery }));
    expect(early(91)).toMatchObject({ verdict: 'not judged', unit: '%' });
    expect(early(91).value).toBeCloseTo(15, 9);
    expect(early(92).verdict).toBe('met');
    expect(early(null).verdict).toBe('not judged');
  });

  test('D8 labels a result without known dominance', () => {
    expect(judge('D8', assessment({ impedance: { atRiskOhm: 280, unaffectedOhm: 310 } })).reason).toContain('no validated cut-off');
  });

  test('D10 and D11 follow the answer', () => {
    expect(judge('D10', assessment({ reportedSymptoms: true })).verdict).toBe('met');
    expect(judge('D11', assessment()).verdict).toBe('not met');
  });

  test('never meets a higher RVC line without the lower', () => {
    fc.assert(fc.property(fc.integer({ min: 1000, max: 4000 }), fc.integer({ min: 1000, max: 4000 }), (atRiskMl, unaffectedMl) => {
      const now = assessment({ atRiskMl, unaffectedMl });
      if (judge('D6', now).verdict === 'met') expect(judge('D5', now).verdict).toBe('met');
    }));
  });
});

describe('occurrence over time', () => {
  const visit = (day: number, verdict: JudgedVisit['verdict'], scheduled = true): JudgedVisit => ({ day, verdict, scheduled });

  test('lies between the last clear visit and the first that meets; unjudged visits are neither', () => {
    const timeline = [visit(0, 'not met'), visit(90, 'not met'), visit(180, 'not judged'), visit(270, 'met')];
    expect(firstOccurrence(timeline)).toEqual({ index: 3, day: 270, interval: { after: 90, upTo: 270 } });
    expect(firstOccurrence([visit(0, 'met')])).toMatchObject({ interval: { after: null, upTo: 0 } });
    expect(firstOccurrence([visit(0, 'not met')])).toBeNull();
  });

  test('is confirmed by the next scheduled visit only', () => {
    expect(sustained([visit(0, 'not met'), visit(90, 'met'), visit(95, 'met', false), visit(180, 'not met')])).toBeNull();
    expect(sustained([visit(90, 'met'), visit(120, 'not met', false), visit(180, 'met')])?.day).toBe(90);
    expect(sustained([visit(90, 'met'), visit(180, 'not judged'), visit(270, 'met')])).toBeNull();
    expect(sustained([visit(90, 'met')])).toBeNull();
  });

  test('does not depend on the order of rows, and confirmation never comes before first sight', () => {
    const timelines = fc.uniqueArray(fc.record({ day: fc.nat(1000), verdict: fc.constantFrom('met' as const, 'not met' as const, 'not judged' as const), scheduled: fc.boolean() }), { selector: ({ day }) => day, maxLength: 12 });
    fc.assert(fc.property(timelines, (timeline) => {
      const first = firstOccurrence(timeline);
      expect(firstOccurrence(timeline.toReversed())?.day).toBe(first?.day);
      expect(sustained(timeline.toReversed())?.day).toBe(sustained(timeline)?.day);
      const confirmed = sustained(timeline);
      if (confirmed) expect(confirmed.day).toBeGreaterThanOrEqual(first?.day ?? Number.POSITIVE_INFINITY);
      if (first?.interval.after != null) expect(first.interval.after).toBeLessThan(first.day);
    }));
  });

  test('early swelling and swelling round an infection can be left out', () => {
    const timeline = [visit(91, 'met'), visit(92, 'met')];
    expect(excludeEarly(timeline, { surgeryDay: 0, days: 91 }).map(({ verdict }) => verdict)).toEqual(['not judged', 'met']);
    expect(excludeAround([visit(100, 'met'), visit(128, 'met'), visit(129, 'met')], { episodeDays: [100], days: 28 }).map(({ verdict }) => verdict)).toEqual(['not judged', 'not judged', 'met']);
  });
});
