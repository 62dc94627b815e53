import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';
import { openQuery } from '@/lib/queries/raise-query';
import { findTarget } from '@/lib/queries/targets';
import type { Work } from '@/lib/work/work';
import type { Found } from './findings';

const columnOf = (place: string): string => (place === 'weight' ? 'body_weight_g' : place === 'ratio' ? 'impedance_ratio' : 'measured_at');

/** A doubt that arose while nobody was at the form becomes a query, beside its value. */
export async function queryUnexplained(work: Work, { assessment, trials }: { assessment: LimbAssessment; trials: readonly LimbTrial[] }, findings: readonly Found[]): Promise<void> {
  for (const { place, message, check } of findings) {
    const [side, trial, level] = place.split(' ');
    const row = trials.find((candidate) => candidate.side === side && candidate.trial === Number(trial));
    const target =
      row && level !== undefined
        ? ({ table: 'limb_trial', id: row.id, field: `circumferences_mm.${level}` } as const)
        : ({ table: 'limb_assessment', id: assessment.id, field: columnOf(place) } as const);
    await openQuery(work, await findTarget(work, target), message, { kind: 'check', checkId: check });
  }
}
