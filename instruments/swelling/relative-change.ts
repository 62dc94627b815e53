import { relativeVolumeChange } from '../measurement/relative-volume-change';
import { printChange } from '../numbers';
import { isAtLeast } from '../threshold';
import { defineSwelling, notJudged, verdict, type SwellingAssessment } from './define-swelling';

/** RVC as a ratio, or null where a volume is missing or zero. */
export function rvcOf(assessment: SwellingAssessment, baseline: SwellingAssessment | null): number | null {
  const atRiskMl = assessment.atRisk.volumeMl;
  const unaffectedMl = assessment.unaffected.volumeMl;
  const baselineAtRiskMl = baseline?.atRisk.volumeMl;
  const baselineUnaffectedMl = baseline?.unaffected.volumeMl;
  if (!atRiskMl || !unaffectedMl || !baselineAtRiskMl || !baselineUnaffectedMl) return null;
  return relativeVolumeChange({ baselineAtRiskMl, baselineUnaffectedMl, atRiskMl, unaffectedMl });
}

export const d5Rvc5 = defineSwelling({
  code: 'D5',
  name: 'RVC 5 %',
  sentence: 'Relative volume change is 5 % or more.',
  needsBaseline: true,
  source: 'Ancukiewicz 2011, IJROBP 79:1436; 5 to under 10 % is called subclinical',
  rvcLinePct: 5,
  judge(assessment, baseline) {
    const rvc = rvcOf(assessment, baseline);
    if (rvc === null) return notJudged('A volume is missing, now or at baseline.');
    return verdict(isAtLeast(rvc, 0.05), rvc * 100, '%', `RVC ${printChange(rvc * 100)} %; the line is 5 %.`);
  },
});

export const d6Rvc10 = defineSwelling({
  code: 'D6',
  name: 'RVC 10 % after 3 months',
  sentence: 'Relative volume change is 10 % or more, more than 3 months after surgery.',
  needsBaseline: true,
  source: 'McDuff 2019; Naoum 2020, JCO',
  rvcLinePct: 10,
  judge(assessment, baseline, { earlyExclusionDays }) {
    const rvc = rvcOf(assessment, baseline);
    if (rvc === null) return notJudged('A volume is missing, now or at baseline.');
    if (assessment.daysSinceSurgery === null) return notJudged('The date of surgery is not known.');
    if (assessment.daysSinceSurgery <= earlyExclusionDays) {
      return { ...notJudged(`Day ${assessment.daysSinceSurgery} after surgery; swelling counts after day ${earlyExclusionDays}.`), value: rvc * 100, unit: '%' };
    }
    return verdict(isAtLeast(rvc, 0.1), rvc * 100, '%', `RVC ${printChange(rvc * 100)} %; the line is 10 %.`);
  },
});
