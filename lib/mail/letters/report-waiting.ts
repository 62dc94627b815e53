import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

/** Site and time only: who sent the report, and what it says, wait behind the sign-in. */
export const reportWaiting = defineLetter({
  name: 'report-waiting',
  data: z.strictObject({ siteName: z.string().max(120), dueBy: z.string().max(120), url: z.url() }),
  example: { siteName: 'Northmoor', dueBy: 'Thu 4 Mar 2027, 17:00, by the clock of Europe/London (UTC+00:00)', url: 'https://registry.example/safety' },
  subject: ({ siteName }) => `A report waits at ${siteName}`,
  text: ({ siteName, dueBy, url }) => `A report waits at ${siteName}. It is to be read and reviewed by:

${dueBy}

Read it here, after signing in:

${url}

You receive this because you hold a role at this site. Nothing of the report stands in this letter.`,
  html: ({ siteName, dueBy, url }) =>
    html`<p>A report waits at ${siteName}. It is to be read and reviewed by <strong>${dueBy}</strong>.</p>` +
    linkButton(url, 'Sign in and read it') +
    html`<p>You receive this because you hold a role at this site. Nothing of the report stands in this letter.</p>`,
});
