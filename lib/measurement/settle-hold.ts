import type { Work } from '@/lib/work/work';

/**
 * Whether training waits. One place: from a report that asks to hold until its review; after a review that ended in an
 * unscheduled visit or an adverse event, until the next completed limb assessment.
 */
const isHeld = `exists (select from symptom_report r where r.participant_id = participant.id and r.hold_training and (r.state <> 'reviewed'
    or (r.outcome in ('unscheduled visit', 'adverse event')
      and not exists (select from limb_assessment a where a.participant_id = r.participant_id and a.state = 'complete' and a.completed_at > r.reviewed_at))))`;

/** Brings the participant's hold in line with the reports. Returns whether training waits now. */
export async function settleHold(work: Work, participantId: string): Promise<boolean> {
  await work.em.flush();
  await work.sql(`update participant set training_held = ${isHeld}, version = version + 1 where id = ? and training_held <> ${isHeld}`, [participantId]);
  const [row] = await work.sql<{ held: boolean }>('select training_held as held from participant where id = ?', [participantId]);
  return row?.held ?? false;
}
