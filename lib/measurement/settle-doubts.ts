import { isDeepStrictEqual } from 'node:util';
import type { Work } from '@/lib/work/work';
import { findDoubts, type Doubted } from './find-doubts';
import type { Found, KeptFinding } from './findings';
import type { CompleteAssessmentInput } from './input';
import { queryUnexplained } from './query-unexplained';
import { isSame, requireReasons } from './require-reasons';

/** Doubts about an arm as a whole, whose figure moves a little with every reading that is corrected. */
const wholeArms: readonly string[] = ['left', 'right', 'whole'];

/** The same doubt about the same figure: the sentence names the figure. A doubt about a whole arm is the same while it holds. */
const isUnchanged = (a: Found, b: Found): boolean => isSame(a, b) && (a.message === b.message || wholeArms.includes(a.place));

/** Doubts that still hold keep the reason they were kept for, new ones get theirs; the others fall. */
function keptNow(one: Doubted, arisen: readonly KeptFinding[]): KeptFinding[] {
  const stored = one.assessment.findings as KeptFinding[];
  return one.found.map((finding) => arisen.find((fresh) => isSame(fresh, finding)) ?? { ...finding, reason: stored.find((old) => isUnchanged(old, finding))?.reason ?? null });
}

/**
 * Holds a correction against every edit check, as saving the form did. What cannot be right is refused, and what is newly
 * doubtful on the corrected form needs its reason; a doubt that the correction casts on another visit becomes a query there.
 * @throws Refusal 'invalid' at the value, or with the doubts that need a reason.
 */
export async function settleDoubts(work: Work, correctedId: string | null, { participantId, before, kept }: { participantId: string; before: readonly Doubted[]; kept: CompleteAssessmentInput['kept'] }): Promise<void> {
  const after = await findDoubts(work, participantId);
  for (const one of after) {
    const known = before.find(({ assessment }) => assessment.id === one.assessment.id)?.found ?? [];
    const fresh = one.found.filter((finding) => !known.some((old) => isUnchanged(old, finding)));
    const isCorrected = one.assessment.id === correctedId;
    const arisen = isCorrected ? requireReasons(fresh, kept, 'value') : fresh.map((finding) => ({ ...finding, reason: null }));
    const findings = keptNow(one, arisen);
    if (!isDeepStrictEqual(findings, one.assessment.findings)) one.assessment.findings = findings;
    if (!isCorrected) await queryUnexplained(work, one, fresh);
  }
}
