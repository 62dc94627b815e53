import { interLimbDifference } from '../measurement/inter-limb-difference';
import { printChange, printNumber } from '../numbers';
import { isAbove, isAtLeast } from '../threshold';
import { defineSwelling, notJudged, verdict } from './define-swelling';

const NO_VOLUME = 'A volume is missing on one arm.';

export const d3InterLimb200ml = defineSwelling({
  code: 'D3',
  name: 'Volume difference 200 mL',
  sentence: 'The at-risk arm holds 200 mL or more above the other.',
  needsBaseline: false,
  source: 'Armer & Stewart 2005, Lymphat Res Biol 3:208',
  judge(assessment) {
    const { differenceMl } = interLimbDifference(assessment);
    if (differenceMl === null) return notJudged(NO_VOLUME);
    return verdict(isAtLeast(differenceMl, 200), differenceMl, 'mL', `Difference ${printNumber(differenceMl)} mL; the line is 200 mL.`);
  },
});

export const d4AtRisk200ml = defineSwelling({
  code: 'D4',
  name: 'At-risk arm grown by 200 mL',
  sentence: 'The at-risk arm holds 200 mL or more above its own baseline, not corrected for the other arm.',
  needsBaseline: true,
  source: 'Absolute change of the at-risk arm, uncorrected; counts weight gain as swelling (clinical-checks RVC-05)',
  judge(assessment, baseline) {
    if (assessment.atRisk.volumeMl === null || baseline?.atRisk.volumeMl == null) return notJudged('A volume of the at-risk arm is missing.');
    const growthMl = assessment.atRisk.volumeMl - baseline.atRisk.volumeMl;
    return verdict(isAtLeast(growthMl, 200), growthMl, 'mL', `Grown by ${printNumber(growthMl)} mL; the line is 200 mL.`);
  },
});

export const d7InterLimb10pct = defineSwelling({
  code: 'D7',
  name: 'Volume difference above 10 %',
  sentence: 'The at-risk arm is more than 10 % larger than the other.',
  needsBaseline: false,
  source: 'Inter-limb difference, unaffected arm as denominator; Armer & Stewart 2005',
  judge(assessment) {
    const { differencePct } = interLimbDifference(assessment);
    if (differencePct === null) return notJudged(NO_VOLUME);
    return verdict(isAbove(differencePct, 10), differencePct, '%', `Difference ${printChange(differencePct)} %; the line is above 10 %.`);
  },
});

export const d9InterLimbIncrease = defineSwelling({
  code: 'D9',
  name: 'Volume difference grown',
  sentence: 'The difference between the arms, in percent of the other arm, has grown since baseline by the points the protocol sets.',
  needsBaseline: true,
  source: '5 points or more: Schmitz 2009, NEJM 361:664; above 3 points: Ammitzboll 2019, Cancer 125:1683; both by water displacement',
  judge(assessment, baseline, { interLimbIncrease: { points, bound } }) {
    const now = interLimbDifference(assessment).differencePct;
    const before = baseline && interLimbDifference(baseline).differencePct;
    if (now === null || before === null) return notJudged('A volume is missing on one arm, now or at baseline.');
    const growth = now - before;
    const met = bound === 'at least' ? isAtLeast(growth, points) : isAbove(growth, points);
    return verdict(met, growth, 'points', `Grown by ${printChange(growth)} points; the line is ${bound} ${points}.`);
  },
});
