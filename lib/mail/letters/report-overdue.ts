import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

/** Goes out once for each report; site and time only. */
export const reportOverdue = defineLetter({
  name: 'report-overdue',
  data: z.strictObject({ siteName: z.string().max(120), dueBy: z.string().max(120), url: z.url() }),
  example: { siteName: 'Northmoor', dueBy: 'Thu 4 Mar 2027, 17:00, by the clock of Europe/London (UTC+00:00)', url: 'https://registry.example/safety' },
  subject: ({ siteName }) => `A report at ${siteName} is past its deadline`,
  text: ({ siteName, dueBy, url }) => `A report at ${siteName} is past its deadline and nobody has opened it. It was to be read and reviewed by:

${dueBy}

Read it here, after signing in:

${url}

This letter is written once for each report. Nothing of the report stands in it.`,
  html: ({ siteName, dueBy, url }) =>
    html`<p>A report at ${siteName} is past its deadline and nobody has opened it. It was to be read and reviewed by <strong>${dueBy}</strong>.</p>` +
    linkButton(url, 'Sign in and read it') +
    html`<p>This letter is written once for each report. Nothing of the report stands in it.</p>`,
});
