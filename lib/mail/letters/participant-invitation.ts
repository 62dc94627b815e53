import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

export const participantInvitation = defineLetter({
  name: 'participant-invitation',
  data: z.strictObject({ greetingName: z.string().max(80), siteName: z.string().max(120), url: z.url(), validDays: z.int().positive() }),
  example: { greetingName: 'Ada', siteName: 'Northmoor', url: 'https://registry.example/join/example', validDays: 14 },
  subject: ({ siteName }) => `Your invitation from ${siteName}`,
  text: ({ greetingName, siteName, url, validDays }) => `Hello ${greetingName},

${siteName} has opened your own pages for you. Choose a password to begin:

${url}

The link works once, within ${validDays} days. If it has run out, ask ${siteName} for a new one. If you did not expect this, ignore it.`,
  html: ({ greetingName, siteName, url, validDays }) =>
    html`<p>Hello ${greetingName},</p><p>${siteName} has opened your own pages for you. Choose a password to begin.</p>` +
    linkButton(url, 'Choose a password') +
    html`<p>The link works once, within ${validDays} days. If it has run out, ask ${siteName} for a new one. If you did not expect this, ignore it.</p>`,
});
