import { TrainingFlagSchema, type TrainingFlag as FlagRow } from '@/entities/training-flag';
import { judgeSessions, type TrainingFlag } from '@/instruments/training/judge-sessions';
import type { OwnRecord } from '@/lib/people/find-own-record';
import type { Work } from '@/lib/work/work';
import { toTrainingSession, type TrainingRecord } from './training-record';

/** What a flag keeps beside its rule: kilograms (or a band's level), days. */
export interface FlagDetail {
  readonly severity: TrainingFlag['severity'];
  readonly on: string;
  readonly key: string | null;
  readonly load: number | null;
  readonly previousLoad: number | null;
  readonly lastWeekLoad: number | null;
  readonly gapDays: number | null;
}

const detailOf = ({ severity, on, key, facts }: TrainingFlag): FlagDetail => ({
  severity,
  on,
  key,
  load: facts?.load ?? null,
  previousLoad: facts?.previous?.load ?? null,
  lastWeekLoad: facts?.lastWeekMax ?? null,
  gapDays: facts?.gapDays ?? null,
});

const differs = (row: FlagRow, detail: FlagDetail): boolean => Object.entries(detail).some(([name, value]) => row.detail[name] !== value);

/**
 * Judges every session again and brings the kept flags in line: new ones are raised, those no longer met are withdrawn
 * and kept, those met again stand again. A late entry may change the flags of later sessions.
 */
export async function judgeRecord(work: Work, { participant }: OwnRecord, record: TrainingRecord): Promise<TrainingFlag[]> {
  const found = judgeSessions(record.sessions.map(toTrainingSession), record.assessmentsOn, record.baselineOn, record.settings);
  const kept = new Map((await work.em.find(TrainingFlagSchema, { participantId: participant.id })).map((row) => [row.flagKey, row]));
  for (const flag of found) {
    const row = kept.get(flag.id);
    const detail = detailOf(flag);
    kept.delete(flag.id);
    if (!row) {
      work.em.create(TrainingFlagSchema, {
        siteId: participant.siteId,
        participantId: participant.id,
        sessionId: flag.sessionId,
        flagKey: flag.id,
        rule: flag.rule,
        exercise: flag.key?.split('|')[0] ?? null,
        detail: { ...detail },
        state: 'raised',
        raisedAt: work.now,
      });
      continue;
    }
    if (row.state === 'withdrawn') row.state = 'raised';
    if (differs(row, detail)) row.detail = { ...detail };
  }
  for (const row of kept.values()) row.state = 'withdrawn';
  await work.em.flush();
  return found;
}
