import { isDeepStrictEqual } from 'node:util';
import { ParticipantSchema } from '@/entities/participant';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { computeAssessment } from './compute-assessment';
import { takenBy } from './taken-by';

/**
 * Computes results anew for the assessments that are complete, or for one that is about to be. A corrected baseline
 * changes every later result, so all of a participant's are computed together; what did not change is not written.
 * Change is counted from the completed baseline visit. @throws Refusal 'invalid' when a volume cannot be computed.
 */
export async function recompute(work: Work, participantId: string, completingId?: string): Promise<void> {
  const participant = await work.em.findOne(ParticipantSchema, { id: participantId });
  if (!participant) throw new Refusal('not-found', 'There is no such participant in your reach.');
  const taken = await takenBy(work, participantId, completingId);
  const baseline = taken.find(({ visit }) => visit.key === 'baseline') ?? null;
  for (const { assessment, visit, sitting } of taken) {
    const { swelling } = (await findProtocol(work, visit.protocolVersionId)).document;
    const computed = computeAssessment({
      sitting,
      arms: participant,
      baseline: baseline && baseline.assessment.id !== assessment.id ? baseline.sitting : null,
      settings: swelling,
    });
    if (computed.leftVolumeMl === null || computed.rightVolumeMl === null)
      throw new Refusal('invalid', 'A level is missing or waits for its third reading, so the volume cannot be computed.');
    assessment.leftVolumeMl = rounded(computed.leftVolumeMl, 3);
    assessment.rightVolumeMl = rounded(computed.rightVolumeMl, 3);
    assessment.rvc = computed.rvc === null ? null : rounded(computed.rvc, 6);
    // The column keeps its keys in an order of its own; only what says something else is written again.
    if (!isDeepStrictEqual(assessment.verdicts, JSON.parse(JSON.stringify(computed.verdicts)))) assessment.verdicts = { ...computed.verdicts };
    assessment.formulaVersion = computed.formulaVersion;
  }
}

/** As the column keeps it, so that an unchanged result is not written again. */
const rounded = (value: number, decimals: number): number => Number(value.toFixed(decimals));
