import 'server-only';
import { z } from 'zod';
import { may, type Act } from '@/lib/auth/policy';
import type { Actor } from '@/lib/auth/roles';
import { log } from '@/lib/log';
import { Refusal } from '@/lib/work/refusal';
import { problemResponse } from './problem';
import { newReference, requireOwnOrigin } from './request';
import type { Declaration, RouteHandler } from './route';
import { currentSession } from './session';

/** An address that takes a file as its whole body. */
export interface UploadDeclaration<I extends z.ZodType<object>, R> {
  readonly act: Act;
  readonly summary: string;
  /** Path parameters. */
  readonly input: I;
  /** Media types that are taken, for whoever reads the API's description: what a file is, `receive` judges by its content. */
  readonly types: readonly string[];
  readonly bytesMost: number;
  /** Judges and keeps the content; opens its own work, because files are not touched inside a transaction. */
  receive(actor: Actor, input: z.output<I>, content: Buffer, options: { request: string }): Promise<R>;
}

/** The body, counted while it arrives: what says it is small and is not stops here. */
async function readCounted(request: Request, bytesMost: number): Promise<Buffer> {
  const tooLarge = () => new Refusal('too-large', `The file is larger than ${Math.round(bytesMost / 1_000_000)} MB. Scan the form in grey, or photograph one page at a time.`, 'file');
  if (Number(request.headers.get('content-length') ?? 0) > bytesMost) throw tooLarge();
  const parts: Uint8Array[] = [];
  let count = 0;
  for await (const part of (request.body ?? []) as AsyncIterable<Uint8Array>) {
    count += part.byteLength;
    if (count > bytesMost) throw tooLarge();
    parts.push(part);
  }
  const said = request.headers.get('content-length');
  if (said !== null && Number(said) !== count) throw new Refusal('invalid', 'The file did not arrive whole. Send it again.', 'file');
  return Buffer.concat(parts);
}

/** The wrapper for uploads: origin, session, policy before a byte is read, then the counted body. Answers 201. */
export function uploadRoute<I extends z.ZodType<object>, R>(declaration: UploadDeclaration<I, R>): RouteHandler {
  const { act, summary, input, types, bytesMost } = declaration;
  const handle = async (request: Request, context: { params: Promise<Record<string, string | string[]> | undefined> }): Promise<Response> => {
    const reference = newReference();
    try {
      requireOwnOrigin(request);
      const session = await currentSession();
      if (!session) throw new Refusal('unauthenticated', 'You are signed out. Sign in again in another tab, then send the file.');
      if (!may(session.actor.role, act)) throw new Refusal('forbidden', 'Your role does not include this.');
      const parsed = input.parse((await context.params) ?? {});
      const content = await readCounted(request, bytesMost);
      const result = await declaration.receive(session.actor, parsed, content, { request: reference });
      log().info({ reference, act, role: session.actor.role });
      return Response.json(result, { status: 201, headers: { 'cache-control': 'no-store', 'x-content-type-options': 'nosniff' } });
    } catch (error) {
      return problemResponse(error, { reference, act });
    }
  };
  const shown: Declaration = { act, summary, input, upload: { types, bytesMost }, run: () => Promise.reject(new Error('An upload is received, not run.')) };
  return Object.assign(handle, { declaration: shown });
}
