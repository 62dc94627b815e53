import type { EntityManager, IsolationLevel } from '@mikro-orm/postgresql';
import type { Act } from '@/lib/auth/policy';
import type { Actor } from '@/lib/auth/roles';
import type { Job } from '@/lib/jobs/define-job';

/** What a service works with: one transaction, one actor, one moment. */
export interface Work {
  readonly em: EntityManager;
  readonly actor: Actor;
  readonly act: Act;
  /** The moment of this transaction. Services take the time from here. */
  readonly now: Date;
  /** Why a value changes, as the person wrote it. */
  readonly reason: string | null;
  /** Raw SQL inside the transaction; `?` placeholders. timestamptz and numeric come back as text. */
  sql<Row>(text: string, values?: readonly unknown[]): Promise<Row[]>;
  /** Side effects after commit: a job row in this transaction. */
  later<P extends object>(job: Job<P>, payload: P, options?: { startAfter?: Date; onceKey?: string; onceSeconds?: number }): Promise<void>;
  /** Writes to the audit trail what changes no row (a sign-in, a reading of identity data, a download). */
  event(subject: string, subjectId: string, detail: Record<string, unknown>, of?: { siteId?: string; participantId?: string }): Promise<void>;
  /** Refuses with 'stale' unless the caller saw this version (If-Match). */
  expect(row: { version: number }): void;
}

/** How a transaction is opened. */
export interface WorkOptions {
  readonly reason?: string | null;
  readonly request?: string;
  /** The version the caller saw. */
  readonly expectedVersion?: number | null;
  readonly isolation?: IsolationLevel;
  /** Fixed by the seed and by tests. */
  readonly now?: Date;
}
