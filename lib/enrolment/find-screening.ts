import { EligibilityAnswerSchema } from '@/entities/eligibility-answer';
import { ScreeningSchema, type Screening } from '@/entities/screening';
import type { ProtocolDocument } from '@/lib/protocol/document';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A screening in reach. @throws Refusal 'not-found'. */
export async function findScreening(work: Work, id: string): Promise<Screening> {
  const screening = await work.em.findOne(ScreeningSchema, { id });
  if (!screening) throw new Refusal('not-found', 'There is no such screening.');
  return screening;
}

/** One criterion with its answer. */
export interface CriterionView {
  readonly key: string;
  readonly text: string;
  readonly lets: 'yes' | 'no';
  readonly answer: 'yes' | 'no' | null;
  /** Of the answer; 0 before there is one. */
  readonly version: number;
  /** The answer keeps the person out. */
  readonly stops: boolean;
}

/** The checklist of the protocol version the screening was opened under, with the answers so far. */
export async function listCriteria(work: Work, screeningId: string, document: ProtocolDocument): Promise<CriterionView[]> {
  const answers = await work.em.find(EligibilityAnswerSchema, { screeningId });
  return document.eligibility.map(({ key, text, lets }) => {
    const given = answers.find(({ criterion }) => criterion === key);
    const answer = given?.answer ?? null;
    return { key, text, lets, answer, version: given?.version ?? 0, stops: answer !== null && answer !== lets };
  });
}
