import { z } from 'zod';
import { defineLetter, html, linkButton } from '../define-letter';

/** Code and visit only: the value and the question wait behind the sign-in. */
export const queryRaised = defineLetter({
  name: 'query-raised',
  data: z.strictObject({ participantCode: z.string().max(20), visitName: z.string().max(80), url: z.url() }),
  example: { participantCode: 'NM-0007-K', visitName: 'Week 12', url: 'https://registry.example/queries/example' },
  subject: ({ participantCode }) => `Data query on ${participantCode}`,
  text: ({ participantCode, visitName, url }) => `A monitor has raised a data query on ${participantCode}, ${visitName}. Read and answer it here:

${url}`,
  html: ({ participantCode, visitName, url }) =>
    html`<p>A monitor has raised a data query on ${participantCode}, ${visitName}.</p>` + linkButton(url, 'Read the query'),
});
