import { impedanceCutoff, impedanceRatio, isAboveCutoff } from '../measurement/impedance-ratio';
import { printNumber } from '../numbers';
import { defineSwelling, notJudged, type SwellingVerdict, verdict } from './define-swelling';

export const d8Impedance = defineSwelling({
  code: 'D8',
  name: 'Impedance ratio above cut-off',
  sentence: 'The impedance ratio is above the cut-off the protocol chose, by dominance of the at-risk arm.',
  needsBaseline: false,
  source: 'Cut-offs by Cornish 2001, Ward 2011 (Lymphat Res Biol 9:47) or Steele 2018; the set is a protocol setting',
  judge({ impedance }, _baseline, { impedanceCutoffs, atRiskIsDominant }) {
    if (impedance === null) return notJudged('Impedance was not measured.');
    const ratio = impedanceRatio(impedance);
    const cutoff = impedanceCutoff(impedanceCutoffs, atRiskIsDominant);
    const label = atRiskIsDominant === null ? ' Dominance is not known: no validated cut-off, the lower one was used.' : '';
    return verdict(isAboveCutoff(ratio, impedanceCutoffs, atRiskIsDominant), ratio, 'ratio', `Ratio ${printNumber(ratio, 3)}; the line is above ${printNumber(cutoff, 3)}.${label}`);
  },
});

export const d10Symptoms = defineSwelling({
  code: 'D10',
  name: 'Reported heaviness or swelling',
  sentence: 'The participant reports heaviness or swelling of the arm, now or within 12 months.',
  needsBaseline: false,
  source: 'Armer & Stewart 2005, Lymphat Res Biol 3:208',
  judge: ({ reportedSymptoms }) => yesNo(reportedSymptoms, { yes: 'Heaviness or swelling was reported.', no: 'Neither was reported.', missing: 'The question was not answered.' }),
});

export const d11Clinician = defineSwelling({
  code: 'D11',
  name: 'Clinician-diagnosed swelling',
  sentence: 'A clinician has diagnosed swelling of the at-risk arm.',
  needsBaseline: false,
  source: 'Clinical diagnosis as recorded',
  judge: ({ clinicianDiagnosed }) => yesNo(clinicianDiagnosed, { yes: 'A clinician recorded the diagnosis.', no: 'No diagnosis was recorded.', missing: 'Not asked.' }),
});

function yesNo(answer: boolean | null, say: { yes: string; no: string; missing: string }): SwellingVerdict {
  if (answer === null) return notJudged(say.missing);
  return { verdict: answer ? 'met' : 'not met', value: null, unit: '', reason: answer ? say.yes : say.no };
}
