import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

export const staffInvitation = defineLetter({
  name: 'staff-invitation',
  data: z.strictObject({ greetingName: z.string().max(80), roleName: z.string().max(60), url: z.url(), validDays: z.int().positive() }),
  example: { greetingName: 'Robin', roleName: 'site coordinator', url: 'https://registry.example/join/example', validDays: 7 },
  subject: () => 'Your Tidemark account',
  text: ({ greetingName, roleName, url, validDays }) => `Hello ${greetingName},

An account with the role ${roleName} has been made for you. Choose a password to begin:

${url}

The link works once, within ${validDays} days. If you did not expect this, ignore it.`,
  html: ({ greetingName, roleName, url, validDays }) =>
    html`<p>Hello ${greetingName},</p><p>An account with the role ${roleName} has been made for you. Choose a password to begin.</p>` +
    linkButton(url, 'Choose a password') +
    html`<p>The link works once, within ${validDays} days. If you did not expect this, ignore it.</p>`,
});
