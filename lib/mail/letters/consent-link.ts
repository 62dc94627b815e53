import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

export const consentLink = defineLetter({
  name: 'consent-link',
  data: z.strictObject({ greetingName: z.string().max(80), siteName: z.string().max(120), url: z.url(), validDays: z.int().positive() }),
  example: { greetingName: 'Ada', siteName: 'Northmoor', url: 'https://registry.example/consent/example', validDays: 14 },
  subject: ({ siteName }) => `Something to read from ${siteName}`,
  text: ({ greetingName, siteName, url, validDays }) => `Hello ${greetingName},

${siteName} has sent you information to read at home, in your own time. Nothing begins unless you agree, and you can stop at any page:

${url}

The link is for you alone and works for ${validDays} days. Questions? Ask ${siteName} before you decide.`,
  html: ({ greetingName, siteName, url, validDays }) =>
    html`<p>Hello ${greetingName},</p><p>${siteName} has sent you information to read at home, in your own time. Nothing begins unless you agree, and you can stop at any page.</p>` +
    linkButton(url, 'Read the information') +
    html`<p>The link is for you alone and works for ${validDays} days. Questions? Ask ${siteName} before you decide.</p>`,
});
