import { Migrator } from '@mikro-orm/migrations';
import { defineConfig } from '@mikro-orm/postgresql';
import { entities } from './entities';
import { Foundation } from './migrations/2026-12-01-01-foundation';
import { People } from './migrations/2026-12-01-02-people';
import { ProtocolConsent } from './migrations/2026-12-01-03-protocol-consent';
import { TheRecord } from './migrations/2026-12-01-04-record';
import { ReviewRelease } from './migrations/2026-12-01-05-review-release';

/**
 * One configuration for the application, the migrations and the command line. Who connects says where to
 * (the command line reads MIKRO_ORM_CLIENT_URL), so that reading this file needs no data base.
 */
export default defineConfig({
  entities,
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
