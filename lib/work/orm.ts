import 'server-only';
import { MikroORM } from '@mikro-orm/postgresql';
import { env } from '@/lib/env';
import config from '@/mikro-orm.config';

// A bundler may evaluate this module once per layer; one process has one pool all the same.
const shared = globalThis as typeof globalThis & { tidemarkOrm?: Promise<MikroORM> };

/** The one ORM of this process. */
export function getOrm(): Promise<MikroORM> {
  shared.tidemarkOrm ??= MikroORM.init({ ...config, clientUrl: env().DATABASE_URL }).catch((error: unknown) => {
    delete shared.tidemarkOrm;
    throw error;
  });
  return shared.tidemarkOrm;
}
