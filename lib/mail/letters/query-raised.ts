import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

/** Who asks: somebody who looked, or a check that ran when a value was saved. */
const raisedBy = { manual: 'A monitor has raised a data query', check: 'An edit check has raised a data query' } as const;

/** Code and visit only: the value and the question wait behind the sign-in. */
export const queryRaised = defineLetter({
  name: 'query-raised',
  data: z.strictObject({ participantCode: z.string().max(20), visitName: z.string().max(80), url: z.url(), origin: z.enum(['manual', 'check']).default('manual') }),
  example: { participantCode: 'NM-0007-K', visitName: 'Week 12', url: 'https://registry.example/queries/example', origin: 'manual' as const },
  subject: ({ participantCode }) => `Data query on ${participantCode}`,
  text: ({ participantCode, visitName, url, origin }) => `${raisedBy[origin]} on ${participantCode}, ${visitName}. Read and answer it here:

${url}`,
  html: ({ participantCode, visitName, url, origin }) =>
    html`<p>${raisedBy[origin]} on ${participantCode}, ${visitName}.</p>` + linkButton(url, 'Read the query'),
});
