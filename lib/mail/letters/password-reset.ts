import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

export const passwordReset = defineLetter({
  name: 'password-reset',
  data: z.strictObject({ url: z.url(), validMinutes: z.int().positive() }),
  example: { url: 'https://registry.example/password/example', validMinutes: 60 },
  subject: () => 'Choose a new password',
  text: ({ url, validMinutes }) => `Someone, perhaps you, asked for a new password for this address. Choose it here:

${url}

The link works once, within ${validMinutes} minutes. If you did not ask, ignore this: your password stays as it is.`,
  html: ({ url, validMinutes }) =>
    '<p>Someone, perhaps you, asked for a new password for this address.</p>' +
    linkButton(url, 'Choose a new password') +
    html`<p>The link works once, within ${validMinutes} minutes. If you did not ask, ignore this: your password stays as it is.</p>`,
});
