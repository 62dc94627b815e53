import { ParticipantSchema } from '@/entities/participant';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { participantInvite } from '@/lib/jobs/handlers/participant-invite';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/**
 * Sends the invitation again; the link before it stops working.
 * @throws Refusal 'conflict' when the person has joined already; 'invalid' without an address.
 */
export async function inviteParticipant(work: Work, { participantId }: { participantId: string }): Promise<{ queued: true }> {
  const participant = await work.em.findOne(ParticipantSchema, { id: participantId });
  if (!participant) throw new Refusal('not-found', 'There is no such participant.');
  const [account] = await work.sql<{ state: string }>('select a.state from account a join role_grant g on g.account_id = a.id where g.of_participant_id = ?', [participantId]);
  if (account?.state !== 'invited') throw new Refusal('conflict', `${participant.code} has joined already and signs in with the own password.`);
  const identity = await work.em.findOne(ParticipantIdentitySchema, { participantId });
  if (!identity?.email) throw new Refusal('invalid', 'There is no e-mail address for the invitation. Add it to the contact details first.', 'email');
  await work.later(participantInvite, { siteId: participant.siteId, participantId });
  return { queued: true };
}
