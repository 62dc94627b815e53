/** What the API says when it refuses: problem details (RFC 9457). */
export interface ProblemDetails {
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  readonly code: string;
  readonly fields?: readonly { readonly field: string; readonly sentence: string }[];
  readonly reference?: string;
}

/** A refusal as an error; `problem.detail` is a sentence for the person. */
export class ProblemError extends Error {
  constructor(readonly problem: ProblemDetails) {
    super(problem.detail);
    this.name = 'ProblemError';
  }
}

const noConnection: ProblemDetails = {
  title: 'No connection',
  status: 0,
  code: 'no-connection',
  detail: 'Not saved, no connection. What you typed is still here; save again when the line is back.',
};

export interface SendOptions {
  /** The version that was seen (If-Match). */
  readonly version?: number;
  /** The create happens once under this key. */
  readonly idempotencyKey?: string;
  /** The token of a consent link, for people who have no account yet. */
  readonly invitationToken?: string;
}

/** One call of the API. Throws ProblemError; never loses what was sent. */
export async function send<T>(
  method: 'GET' | 'POST' | 'PUT' | 'PATCH',
  path: string,
  body?: unknown,
  options: SendOptions = {},
): Promise<T> {
  const headers: Record<string, string> = { accept: 'application/json' };
  if (body !== undefined) headers['content-type'] = 'application/json';
  if (options.version !== undefined) headers['if-match'] = `"v${options.version}"`;
  if (options.idempotencyKey) headers['idempotency-key'] = options.idempotencyKey;
  if (options.invitationToken) headers['invitation-token'] = options.invitationToken;
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      headers,
      credentials: 'same-origin',
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
  } catch {
    throw new ProblemError(noConnection);
  }
  const answer: unknown = await response.json().catch(() => null);
  if (response.ok) return answer as T;
  throw new ProblemError(
    (answer as ProblemDetails | null) ?? {
      ...noConnection,
      title: 'Not saved',
      status: response.status,
      code: 'fault',
      detail: 'Not saved. Try again in a moment.',
    },
  );
}
