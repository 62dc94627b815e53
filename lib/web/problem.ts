import { log } from '@/lib/log';
import { Refusal, type RefusalCode } from '@/lib/work/refusal';
import { unkeepable } from '@/lib/work/unkeepable';
import '@/instruments/schema-words';
import { z } from 'zod';

/** The one map from refusals to HTTP. */
const statusOf: Record<RefusalCode, number> = {
  unauthenticated: 401,
  forbidden: 403,
  'not-found': 404,
  conflict: 409,
  expired: 410,
  stale: 412,
  'too-large': 413,
  invalid: 422,
  locked: 423,
  'precondition-required': 428,
  'too-many': 429,
};

const titleOf: Record<RefusalCode, string> = {
  unauthenticated: 'Sign in first',
  forbidden: 'Not for your role',
  'not-found': 'Not found',
  conflict: 'Not possible now',
  expired: 'No longer valid',
  stale: 'Changed in the meantime',
  'too-large': 'Too large',
  invalid: 'Something to correct',
  locked: 'Closed to changes',
  'precondition-required': 'Say which version you saw',
  'too-many': 'Too many tries',
};

/** One thing to correct, at its field. */
export interface FieldProblem {
  readonly field: string;
  readonly sentence: string;
}

/** Problem details (RFC 9457) with what a person can act on. */
export interface Problem {
  readonly type: string;
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  readonly code: string;
  readonly fields?: readonly FieldProblem[];
  readonly reference?: string;
}

export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  code: z.string(),
  fields: z.array(z.object({ field: z.string(), sentence: z.string() })).optional(),
  reference: z.string().optional(),
});

function problemOf(error: unknown, reference: string): Problem {
  if (error instanceof Refusal) {
    const fields = error.field === undefined ? {} : { fields: [{ field: error.field, sentence: error.sentence }, ...error.beside] };
    return { type: `/problems/${error.code}`, title: titleOf[error.code], status: statusOf[error.code], detail: error.sentence, code: error.code, ...fields };
  }
  if (error instanceof z.ZodError) {
    const fields = error.issues.map(({ path, message }) => ({ field: path.join('.'), sentence: message }));
    const detail = fields.length === 1 && fields[0] ? fields[0].sentence : `${fields.length} things to correct.`;
    return { type: '/problems/invalid', title: titleOf.invalid, status: 422, detail, code: 'invalid', fields };
  }
  const refused = unkeepable(error);
  if (refused) return { type: '/problems/invalid', title: titleOf.invalid, status: 422, detail: refused, code: 'invalid' };
  return {
    type: '/problems/fault',
    title: 'Something went wrong on our side',
    status: 500,
    detail: `Something went wrong on our side. What you entered was not saved; try again. Reference ${reference}.`,
    code: 'fault',
    reference,
  };
}

/** An error as the browser may see it. Faults go to the log with their reference; never with values. */
export function problemResponse(error: unknown, request: { reference: string; act: string }): Response {
  const problem = problemOf(error, request.reference);
  if (problem.status === 500) {
    const { code, table, constraint } = (error ?? {}) as { code?: unknown; table?: unknown; constraint?: unknown };
    // The message may hold values: only where it happened is kept.
    const trace = error instanceof Error ? error.stack?.split('\n').filter((line) => /^\s+at /.test(line)).slice(0, 12) : undefined;
    log().error({ reference: request.reference, act: request.act, name: error instanceof Error ? error.name : typeof error, code, table, constraint, trace });
  }
  return Response.json(problem, { status: problem.status, headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store' } });
}
