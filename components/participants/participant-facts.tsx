import { upperFirst } from '@/instruments/words';
import type { ParticipantView } from '@/lib/participants/view-participant';
import { formatDate, formatNumber, formatVolumeMl } from '../ui/format';
import { FactStrip } from '../ui/page';

const inWords = (code: string): string => upperFirst(code.replaceAll('-', ' '));

function bmi(weightG: number | null, heightMm: number | null): string | null {
  // Body mass index: kg over metres squared.
  return weightG === null || heightMm === null ? null : `BMI ${formatNumber(weightG / 1000 / (heightMm / 1000) ** 2, 1)}`;
}

/** What does not change from visit to visit, in a strip under the code. */
export function ParticipantFacts({ view }: { view: ParticipantView }) {
  const { facts, visits } = view;
  const baseline = visits.find(({ key }) => key === 'baseline');
  const volumes = baseline?.leftVolumeMl && baseline.rightVolumeMl ? `Left ${formatVolumeMl(baseline.leftVolumeMl)}, right ${formatVolumeMl(baseline.rightVolumeMl)}` : null;
  const at = [`Age ${facts.ageYears}`, bmi(facts.baselineWeightG, facts.heightMm), volumes].filter((part) => part !== null).join(', ');
  return (
    <FactStrip
      facts={[
        { term: 'Affected side', value: inWords(facts.affectedSide) },
        { term: 'Dominant hand', value: inWords(facts.dominantSide) },
        { term: 'Cohort', value: `${facts.cohort}, enrolled ${formatDate(facts.enrolledOn)}` },
        { term: 'Surgery', value: `${inWords(facts.surgery)}, ${facts.axillaryProcedure.replaceAll('-', ' ')}, ${formatDate(facts.surgeryOn)}` },
        { term: 'Radiotherapy', value: inWords(facts.radiotherapy) },
        { term: 'Systemic therapy', value: inWords(facts.systemicTherapy) },
        { term: 'At baseline', value: at },
      ]}
    />
  );
}
