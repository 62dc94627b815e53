import { findOwnRecord, refuseAfterLeaving } from '@/lib/people/find-own-record';
import type { LogSessionInput } from '@/lib/training/input';
import { saveSession, type SessionSaved } from '@/lib/training/save-session';
import type { Work } from '@/lib/work/work';
import { reportArmCheck } from './check-arm';
import type { SentReport } from './keep-report';

/** What the participant reads once a session is logged. */
export interface SessionLogged extends SessionSaved {
  readonly report: SentReport | null;
}

/** Logs a session as it was lifted, judges it, and makes sure that a changed arm has its report. Sent twice, it is one session. */
export async function logSession(work: Work, input: LogSessionInput): Promise<SessionLogged> {
  const own = await findOwnRecord(work);
  refuseAfterLeaving(own, 'training');
  const saved = await saveSession(work, own, input);
  return { ...saved, report: await reportArmCheck(work, own, input) };
}
