import { judgeArmCheck } from '@/instruments/safety/judge-arm-check';
import { findOwnRecord, refuseAfterLeaving, type OwnRecord } from '@/lib/people/find-own-record';
import { armCheckCode, type ArmCheckWords } from '@/lib/training/arm-check-words';
import type { Work } from '@/lib/work/work';
import { findSentReport, keepReport, toSentReport, type SentReport } from './keep-report';

/** What an arm check leads to: a report where the arm has changed, otherwise nothing. */
export interface ArmChecked {
  readonly report: SentReport | null;
}

/** Tells the site at once of a change found before training, without waiting for the session to be logged. */
export async function checkArm(work: Work, input: { clientKey: string; armCheck: ArmCheckWords }): Promise<ArmChecked> {
  const own = await findOwnRecord(work);
  refuseAfterLeaving(own, 'training');
  return { report: await reportArmCheck(work, own, { ...input, on: own.today }) };
}

/** One report for one session's arm check, however often it comes. */
export async function reportArmCheck(
  work: Work,
  own: OwnRecord,
  { clientKey, armCheck, on }: { clientKey: string; armCheck: ArmCheckWords; on: string },
): Promise<SentReport | null> {
  const verdict = judgeArmCheck(armCheckCode(armCheck));
  if (!verdict) return null;
  const said = { answers: { signs: [], lastedOverADay: null, soreness: null, armCheck }, noticedOn: on, note: null, clientKey };
  return toSentReport((await findSentReport(work, own, said)) ?? (await keepReport(work, own, { verdict, ...said })), own);
}
