import 'server-only';
import { IsolationLevel, type EntityManager } from '@mikro-orm/postgresql';
import { OptimisticLockError } from '@mikro-orm/core';
import { ruleOf, may, type Act, type Rule } from '@/lib/auth/policy';
import type { Actor } from '@/lib/auth/roles';
import { Unlawful } from '@/entities/lawful';
import { enqueue } from '@/lib/jobs/enqueue';
import { getOrm } from './orm';
import { Refusal } from './refusal';
import { clock } from './time';
import type { Work, WorkOptions } from './work';

/** Settings live for one transaction only: nothing leaks to the next request on the same connection. */
async function settle(em: EntityManager, actor: Actor, act: Act, rule: Rule, options: WorkOptions): Promise<void> {
  const settings: Record<string, string> = {
    'app.actor': actor.accountId,
    'app.role': actor.role,
    'app.act': act,
    'app.reach': actor.reach.join(','),
    'app.participant': actor.participantId ?? '',
    'app.screening': actor.screeningId ?? '',
    'app.identity': rule.identity ?? '',
    'app.reason': options.reason ?? '',
    'app.request': options.request ?? '',
  };
  const names = Object.keys(settings);
  await em.execute(`select ${names.map(() => 'set_config(?, ?, true)').join(', ')}`, names.flatMap((name) => [name, settings[name]]));
}

function makeWork(em: EntityManager, actor: Actor, act: Act, options: WorkOptions): Work {
  return {
    em,
    actor,
    act,
    now: options.now ?? clock(),
    reason: options.reason?.trim() || null,
    sql: (text, values = []) => em.execute(text, [...values]),
    later: async (job, payload, when) => void (await enqueue(em, job, payload, when)),
    event: async (subject, subjectId, detail, of) =>
      void (await em.execute('select audit_event(?, ?, ?::jsonb, ?::uuid, ?::uuid)', [
        subject,
        subjectId,
        JSON.stringify(detail),
        of?.siteId ?? null,
        of?.participantId ?? null,
      ])),
    expect: (row) => {
      if (options.expectedVersion !== undefined && options.expectedVersion !== null && options.expectedVersion !== row.version) throw stale();
    },
  };
}

const stale = () => new Refusal('stale', 'Somebody else saved this in the meantime. Your entry is still here: look at what changed, then save again.');

/** What the data base refused, in words. Its own message may hold values, so only our own exceptions pass it on. */
function translate(error: unknown): unknown {
  if (error instanceof Unlawful) return new Refusal(error.code, error.message);
  if (error instanceof OptimisticLockError) return stale();
  const code = (error as { code?: unknown } | null)?.code;
  if (code === 'TM001') return new Refusal('invalid', 'Say why the value changes.', 'reason');
  if (code === 'TM002') return new Refusal('conflict', 'Consent is not complete, so nothing can be recorded yet.');
  if (code === 'TM003') return new Refusal('locked', 'This questionnaire was submitted and is closed. If an answer is wrong, tell your site; the answers stay as they were sent.');
  if (code === 'TM004') return new Refusal('invalid', 'The day lies outside this participant’s time in the study. Check the year.', 'on');
  if (code === '23505') return new Refusal('conflict', 'This was already saved.');
  if (code === '40001' || code === '40P01') return new Refusal('conflict', 'Two people saved at the same moment. Save again.');
  return error;
}

/**
 * Opens the one transaction of a request: asks the policy, sets who acts and how far the reach goes, runs the service.
 * Nothing else opens transactions.
 * @throws Refusal when the role may not, or when the service or the data base refuses.
 */
export async function withWork<T>(actor: Actor, act: Act, run: (work: Work) => Promise<T>, options: WorkOptions = {}): Promise<T> {
  const rule = ruleOf(act);
  if (!may(actor.role, act)) throw new Refusal('forbidden', 'Your role does not include this.');
  const { em } = await getOrm();
  try {
    return await em.fork().transactional(
      async (tx) => {
        const inner = tx as EntityManager;
        await settle(inner, actor, act, rule, options);
        return run(makeWork(inner, actor, act, options));
      },
      { isolationLevel: options.isolation ?? IsolationLevel.READ_COMMITTED, readOnly: rule.kind === 'read' },
    );
  } catch (error) {
    throw translate(error);
  }
}

/** The same for pages: an act that only reads. */
export const readWork: typeof withWork = (actor, act, run, options) => {
  if (ruleOf(act).kind !== 'read') throw new Error(`${act} writes; open it with withWork.`);
  return withWork(actor, act, run, options);
};
