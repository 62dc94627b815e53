import 'server-only';
import type { z } from 'zod';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { inviteeOf } from '@/lib/auth/invitee';
import { may, ruleOf, type Act } from '@/lib/auth/policy';
import { systemActor, type Actor } from '@/lib/auth/roles';
import { log } from '@/lib/log';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import { problemResponse } from './problem';
import { expectedVersion, idempotencyKey, newReference, originOf, readInput, requestHash, requireOwnOrigin } from './request';
import { currentSession } from './session';

type Input = z.ZodType<Record<string, unknown> | object>;

/** One address of the API, declared once: the handler and the OpenAPI document both come from it. */
export interface Declaration<I extends Input = Input, R = unknown> {
  readonly act: Act;
  /** One line for the OpenAPI page, in the imperative. */
  readonly summary: string;
  /** Path parameters, query (GET) or body (writes), in one object. Unknown fields are refused when it is strict. */
  readonly input: I;
  readonly output?: z.ZodType<R>;
  /** A create: needs an Idempotency-Key, happens once, answers 201. */
  readonly create?: true;
  /** A change: needs If-Match with the version that was seen. */
  readonly change?: true;
  /** A signature: needs the signer's password once more, in `password`. */
  readonly confirms?: true;
  /** The body is a file, whole: what kinds, and how large. */
  readonly upload?: { readonly types: readonly string[]; readonly bytesMost: number };
  /** Nobody need be signed in: the system acts (joining, for one). The service itself must prove who asks. */
  readonly open?: true;
  run(work: Work, input: z.output<I>): Promise<R>;
  /** Turns the result into something other than JSON (a file), after the transaction. */
  respond?(result: R, request: Request): Promise<Response> | Response;
}

export interface RouteHandler {
  /** An address without parameters is given none: not an empty object. */
  (request: Request, context: { params: Promise<Record<string, string | string[]> | undefined> }): Promise<Response>;
  readonly declaration: Declaration;
}

/** Who asks: the signed-in person, the holder of a consent link, or (open routes) the system. */
async function actorOf(request: Request, act: Act, open: boolean): Promise<Actor> {
  if (open) return systemActor();
  const link = request.headers.get('invitation-token');
  if (link && ruleOf(act).roles.includes('invitee')) return inviteeOf({ token: link, from: originOf(request) });
  const session = await currentSession();
  if (!session) throw new Refusal('unauthenticated', 'You are signed out. What you typed is still here: sign in again in another tab, then save.');
  return session.actor;
}

/** Happens once: a second request under the same key gets the first one's answer. */
async function once<R>(work: Work, key: string, hash: string, run: () => Promise<R>): Promise<{ result: R; replayed: boolean }> {
  const fresh = await work.sql(
    'insert into idempotency_key (account_id, key, request_hash) values (?, ?, ?) on conflict do nothing returning key',
    [work.actor.accountId, key, hash],
  );
  if (fresh.length === 0) {
    const [kept] = await work.sql<{ request_hash: string; body: R }>('select request_hash, body from idempotency_key where account_id = ? and key = ?', [
      work.actor.accountId,
      key,
    ]);
    if (kept?.request_hash !== hash) throw new Refusal('conflict', 'This was already sent with other content. Load the page again.');
    return { result: kept.body, replayed: true };
  }
  const result = await run();
  await work.em.flush();
  await work.sql('update idempotency_key set status = 201, body = ?::jsonb where account_id = ? and key = ?', [
    JSON.stringify(result ?? null),
    work.actor.accountId,
    key,
  ]);
  return { result, replayed: false };
}

function answer(result: unknown, status: number, headers: Record<string, string>): Response {
  const version = (result as { version?: unknown } | null | undefined)?.version;
  if (typeof version === 'number') headers['etag'] = `"v${version}"`;
  return Response.json(result ?? null, { status, headers: { 'cache-control': 'no-store', ...headers } });
}

/**
 * The one wrapper for API routes: origin, input, actor, policy, transaction, idempotency, If-Match, problem details.
 * `export const POST = route({ act: 'query.raise', summary: '…', input: raiseQueryInput, create: true, run: raiseQuery })`
 */
export function route<I extends Input, R>(declaration: Declaration<I, R>): RouteHandler {
  const { act, create, change, confirms, open } = declaration;
  const handle = async (request: Request, context: { params: Promise<Record<string, string | string[]> | undefined> }): Promise<Response> => {
    const reference = newReference();
    try {
      requireOwnOrigin(request);
      // Who asks comes first: a role that may not learns nothing of what the input should be.
      const actor = await actorOf(request, act, open ?? false);
      if (!may(actor.role, act)) throw new Refusal('forbidden', 'Your role does not include this.');
      const key = create ? idempotencyKey(request) : null;
      const version = change ? expectedVersion(request) : null;
      const raw = await readInput(request, await context.params);
      const input = declaration.input.parse(raw);
      if (confirms) await confirmPassword(actor, String((input as { password?: unknown }).password ?? ''));
      const reason = (input as { reason?: unknown }).reason;
      const options = { reason: typeof reason === 'string' ? reason : null, request: reference, expectedVersion: version };
      const { result, replayed } = await withWork(
        actor,
        act,
        async (work) =>
          key === null
            ? { result: await declaration.run(work, input), replayed: false }
            : once(work, key, requestHash(new URL(request.url).pathname, input), () => declaration.run(work, input)),
        options,
      );
      log().info({ reference, act, role: actor.role });
      if (declaration.respond) return await declaration.respond(result, request);
      return answer(result, create ? 201 : 200, replayed ? { 'idempotent-replayed': 'true' } : {});
    } catch (error) {
      return problemResponse(error, { reference, act });
    }
  };
  return Object.assign(handle, { declaration: declaration as unknown as Declaration });
}
