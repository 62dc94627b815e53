import { z } from 'zod';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { SiteSchema } from '@/entities/site';
import { systemActor } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import { participantInvitation } from '@/lib/mail/letters/participant-invitation';
import { firstName } from '@/lib/people/first-name';
import { issueLink, linkDays } from '@/lib/people/issue-link';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Mails the invitation to choose a password. A retry makes a new link, and the one before stops working. */
export const participantInvite = defineJob({
  name: 'participant.invite',
  payload: z.strictObject({ siteId: z.uuid(), participantId: z.uuid() }),
  retry: { limit: 7, delaySeconds: 60, backoff: true },
  async run({ siteId, participantId }, { sendLetter, jobId, now }) {
    const posting = await withWork(
      systemActor([siteId]),
      'job.mail',
      async (work) => {
        const identity = await work.em.findOne(ParticipantIdentitySchema, { participantId });
        const [account] = await work.sql<{ id: string }>(
          `select a.id from account a join role_grant g on g.account_id = a.id where g.of_participant_id = ? and a.state = 'invited'`,
          [participantId],
        );
        // Joined since it was asked for, or no address: nothing to send.
        if (!identity?.email || !account) return null;
        const site = await work.em.findOneOrFail(SiteSchema, { id: siteId });
        const token = await issueLink(work, { kind: 'join', siteId, participantId, accountId: account.id });
        return { to: identity.email, data: { greetingName: firstName(identity.name), siteName: site.name, url: `${env().NEXTAUTH_URL}/join/${token}`, validDays: linkDays } };
      },
      { now: now() },
    );
    if (posting) await sendLetter(participantInvitation, { ...posting, id: jobId });
  },
});
