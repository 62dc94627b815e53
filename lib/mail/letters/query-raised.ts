import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

/** Who asks (somebody who looked, or a check that ran when a value was saved), code and visit only: the value and the question wait behind the sign-in. */
export const queryRaised = defineLetter({
  name: 'query-raised',
  data: z.strictObject({ participantCode: z.string().max(20), visitName: z.string().max(80), url: z.url(), raisedBy: z.enum(['A monitor', 'An edit check']).default('A monitor') }),
  example: { participantCode: 'NM-0007-K', visitName: 'Week 12', url: 'https://registry.example/queries/example', raisedBy: 'A monitor' as const },
  subject: ({ participantCode }) => `Data query on ${participantCode}`,
  text: ({ participantCode, visitName, url, raisedBy }) => `${raisedBy} has raised a data query on ${participantCode}, ${visitName}. Read and answer it here:

${url}`,
  html: ({ participantCode, visitName, url, raisedBy }) =>
    html`<p>${raisedBy} has raised a data query on ${participantCode}, ${visitName}.</p>` + linkButton(url, 'Read the query'),
});
