import { ParticipantSchema, type Participant } from '@/entities/participant';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** The participant who acts, with the clock of the site. */
export interface OwnRecord {
  readonly participant: Participant;
  readonly site: { readonly name: string; readonly phone: string; readonly timeZone: string };
  /** Today's date at the site. */
  readonly today: string;
}

/** The record of the participant who is signed in. @throws Refusal 'forbidden' for anybody else. */
export async function findOwnRecord(work: Work): Promise<OwnRecord> {
  const id = work.actor.participantId;
  const participant = id === null ? null : await work.em.findOne(ParticipantSchema, { id });
  if (!participant) throw new Refusal('forbidden', 'Only a participant has a record of their own.');
  const [site] = await work.sql<{ name: string; phone: string; timeZone: string }>('select name, phone, time_zone as "timeZone" from site where id = ?', [participant.siteId]);
  if (!site) throw new Error('The site of a participant exists.');
  return { participant, site, today: localDate(work.now, site.timeZone) };
}

/** After leaving nothing more is recorded, but what the grade of leaving still allows. @throws Refusal 'locked'. */
export function refuseAfterLeaving({ participant, site }: OwnRecord, what: 'training' | 'answers'): void {
  if (participant.state !== 'withdrawn') return;
  if (what === 'answers' && participant.leftGrade !== 'no further data') return;
  throw new Refusal('locked', `You have left this part of the study, so nothing more is recorded. If your arm has changed, call ${site.name} on ${site.phone}.`);
}
