import { LimbTrialSchema, type LimbTrial } from '@/entities/limb-trial';
import { printNumber } from '@/instruments/numbers';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findAssessment } from './find-assessment';

/** The other readings of a level, in millimetres, where a correction touches more than one of them. */
export interface OtherReadings {
  readonly other?: number | undefined;
  readonly third?: number | undefined;
}

const inCm = (mm: number): string => `${printNumber(mm / 10, 1)} cm`;

/**
 * One level after a correction of one of its trials: the other trial may be corrected in the same breath, and a third
 * reading that stands in the source may be added, so that a fault in both trials can be mended.
 * @throws Refusal 'invalid' at 'also' when the trials would differ beyond the tolerance and nothing settles them.
 */
export async function settleLevel(work: Work, row: LimbTrial, level: number, { other, third }: OtherReadings): Promise<void> {
  const { toleranceMm, levelCount } = await findAssessment(work, row.assessmentId);
  const { assessmentId, side, siteId, participantId } = row;
  const trials = await work.em.find(LimbTrialSchema, { assessmentId, side });
  const trialOf = (trial: number): LimbTrial | undefined => trials.find((one) => one.trial === trial);
  const write = (into: LimbTrial, mm: number): void => {
    into.circumferencesMm = into.circumferencesMm.with(level, mm);
  };
  const twin = row.trial === 3 ? undefined : trialOf(row.trial === 1 ? 2 : 1);
  if (other !== undefined && twin) write(twin, other);
  const kept = trialOf(3);
  if (third !== undefined && row.trial !== 3) {
    if (kept) write(kept, third);
    else
      trials.push(
        work.em.create(LimbTrialSchema, { siteId, participantId, assessmentId, side, trial: 3, circumferencesMm: Array.from({ length: levelCount }, (_, at) => (at === level ? third : null)), savedAt: work.now }),
      );
  }
  const reading = (trial: number): number | null => (trial === row.trial ? row : trialOf(trial))?.circumferencesMm[level] ?? null;
  const [first, second] = [reading(1), reading(2)];
  if (first === null || second === null || combineTrials({ first, second, third: reading(3) }, toleranceMm).girthMm !== null) return;
  throw new Refusal('invalid', `Trial 1 would say ${inCm(first)} and trial 2 ${inCm(second)}, ${inCm(Math.abs(first - second))} apart. Correct the other trial too, or give the third reading as it stands in the source.`, 'also');
}
