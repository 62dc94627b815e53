import type { z } from 'zod';
import type { Logger } from '@/lib/log';
import type { SendLetter } from '@/lib/mail/send-letter';
import type { Storage } from '@/lib/storage/storage';

/** What a job may touch besides the data base; tests replace these edges. */
export interface JobDeps {
  readonly log: Logger;
  readonly storage: Storage;
  readonly sendLetter: SendLetter;
  /** The time, read when asked: jobs never take it from the machine themselves. */
  readonly now: () => Date;
  /** Stable over retries of one job: use it to make the job's effect happen once. */
  readonly jobId: string;
}

export interface Retry {
  /** Attempts after the first. */
  readonly limit: number;
  /** Seconds before the first retry; doubled each time when `backoff` is set. */
  readonly delaySeconds: number;
  readonly backoff: boolean;
}

export interface Job<P extends object> {
  readonly name: string;
  readonly payload: z.ZodType<P>;
  readonly retry: Retry;
  /** Five cron fields, UTC, for a job that starts by the clock with an empty payload. */
  readonly cron?: string;
  run(payload: P, deps: JobDeps): Promise<void>;
}

/** A job of the registry whose payload type is known to itself only. */
export interface AnyJob {
  readonly name: string;
  readonly retry: Retry;
  readonly cron?: string;
  runRaw(data: unknown, deps: JobDeps): Promise<void>;
}

/**
 * Defines a job: work done after the transaction that asked for it, by the worker, with retries.
 * It may run twice (a worker can stop between the effect and its receipt), so `run` is idempotent.
 * Payloads hold ids, not personal data: job rows stand outside row-level security.
 */
export function defineJob<P extends object>(job: Job<P>): Job<P> & AnyJob {
  return { ...job, run: job.run, runRaw: async (data, deps) => job.run(job.payload.parse(data), deps) };
}
