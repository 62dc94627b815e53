import { Migrator } from '@mikro-orm/migrations';
import { defineConfig } from '@mikro-orm/postgresql';
import { entities } from './entities';
import { env } from './lib/env';
import { Foundation } from './migrations/2026-12-01-01-foundation';
import { People } from './migrations/2026-12-01-02-people';
import { ProtocolConsent } from './migrations/2026-12-01-03-protocol-consent';
import { TheRecord } from './migrations/2026-12-01-04-record';
import { ReviewRelease } from './migrations/2026-12-01-05-review-release';

/** One configuration for the application, the migrations and the command line. */
export default defineConfig({
  entities,
  clientUrl: env().DATABASE_URL,
  extensions: [Migrator],
  discovery: { warnWhenNoEntities: false },
  pool: { min: 1, max: 10 },
  migrations: {
    snapshot: false,
    disableForeignKeys: false,
    migrationsList: [
      { name: '2026-12-01-01-foundation', class: Foundation },
      { name: '2026-12-01-02-people', class: People },
      { name: '2026-12-01-03-protocol-consent', class: ProtocolConsent },
      { name: '2026-12-01-04-record', class: TheRecord },
      { name: '2026-12-01-05-review-release', class: ReviewRelease },
    ],
  },
});
