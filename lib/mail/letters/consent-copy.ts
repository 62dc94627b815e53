import { z } from 'zod';
import { defineLetter, html } from '../define-letter';

/** Goes out with the signed form as a PDF attachment. */
export const consentCopy = defineLetter({
  name: 'consent-copy',
  data: z.strictObject({ greetingName: z.string().max(80), siteName: z.string().max(120) }),
  example: { greetingName: 'Ada', siteName: 'Northmoor' },
  subject: ({ siteName }) => `Your copy from ${siteName}`,
  text: ({ greetingName, siteName }) => `Hello ${greetingName},

Attached is your copy of what you signed with ${siteName}. Keep it. You can change your mind at any time, without giving a reason, and your care stays the same: tell ${siteName}, or use 'My consent' when you are signed in.`,
  html: ({ greetingName, siteName }) =>
    html`<p>Hello ${greetingName},</p><p>Attached is your copy of what you signed with ${siteName}. Keep it.</p>
<p>You can change your mind at any time, without giving a reason, and your care stays the same: tell ${siteName}, or use ‘My consent’ when you are signed in.</p>`,
});
