import { z } from 'zod';
import { ConsentSchema } from '@/entities/consent';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { SiteSchema } from '@/entities/site';
import { systemActor } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import { consentLink as letter } from '@/lib/mail/letters/consent-link';
import { firstName } from '@/lib/people/first-name';
import { issueLink, linkDays } from '@/lib/people/issue-link';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Mails the link for reading and signing at home. A retry makes a new link, and the one before stops working. */
export const consentLink = defineJob({
  name: 'consent.link',
  payload: z.strictObject({ siteId: z.uuid(), screeningId: z.uuid() }),
  retry: { limit: 7, delaySeconds: 60, backoff: true },
  async run({ siteId, screeningId }, { sendLetter, jobId, now }) {
    const posting = await withWork(
      systemActor([siteId]),
      'job.mail',
      async (work) => {
        const open = await work.em.count(ConsentSchema, { screeningId, mode: 'home', state: 'reading' });
        const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId });
        // Signed, or changed to another way, since the link was asked for: nothing to send.
        if (open === 0 || !identity?.email) return null;
        const site = await work.em.findOneOrFail(SiteSchema, { id: siteId });
        const token = await issueLink(work, { kind: 'consent', siteId, screeningId });
        return { to: identity.email, data: { greetingName: firstName(identity.name), siteName: site.name, url: `${env().NEXTAUTH_URL}/consent/${token}`, validDays: linkDays } };
      },
      { now: now() },
    );
    if (posting) await sendLetter(letter, { ...posting, id: jobId });
  },
});
