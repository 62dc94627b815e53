import { changeOfDifference, interLimbDifference } from '../measurement/inter-limb-difference';
import { printGirthCm } from '../numbers';
import { isAtLeast } from '../threshold';
import { defineSwelling, notJudged, verdict } from './define-swelling';

const THRESHOLD_MM = 20;

export const d1InterLimb2cm = defineSwelling({
  code: 'D1',
  name: 'Girth difference 2 cm',
  sentence: 'The at-risk arm is 2.0 cm or more wider than the other at any level.',
  needsBaseline: false,
  source: 'Armer & Stewart 2005, Lymphat Res Biol 3:208',
  judge(assessment) {
    const max = interLimbDifference(assessment).maxGirth;
    if (max === null) return notJudged('No level was measured on both arms.');
    return verdict(isAtLeast(max.differenceMm, THRESHOLD_MM), max.differenceMm, 'mm', `Largest girth difference ${printGirthCm(max.differenceMm)} cm; the line is 2.0 cm.`);
  },
});

export const d2Change2cm = defineSwelling({
  code: 'D2',
  name: 'Girth difference grown by 2 cm',
  sentence: 'The difference between the arms has grown by 2.0 cm or more since baseline at any level.',
  needsBaseline: true,
  source: 'Inter-limb change from baseline, girth; common practice',
  judge(assessment, baseline) {
    const growth = baseline && changeOfDifference({ now: assessment, baseline });
    if (!growth) return notJudged('No level was measured on both arms both times.');
    return verdict(isAtLeast(growth.differenceMm, THRESHOLD_MM), growth.differenceMm, 'mm', `Largest growth ${printGirthCm(growth.differenceMm)} cm; the line is 2.0 cm.`);
  },
});
