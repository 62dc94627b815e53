/**
 * Fills an empty data base with the invented study 'Steady Lift', as the owner of the tables (OWNER_DATABASE_URL).
 *
 *   node --import tsx --conditions=react-server scripts/seed.ts [--if-empty] [--participants 150] [--light] [--seed 20] [--now 2027-03-03T10:40:00Z] [--quiet]
 *
 * --if-empty leaves a data base that was seeded as it is. --light writes no audit trail and short logs: for the bench only.
 * The same seed, number and moment give the same rows, but for password hashes and the trail's own transaction numbers.
 */
import { parseArgs } from 'node:util';
import { Client } from 'pg';
import { env } from '@/lib/env';
import { demoDefaults, seedStudy, stateOf } from './demo/seed-study';

/** Something the caller can put right. */
class Mendable extends Error {}

function readOptions() {
  const { values } = parseArgs({
    options: {
      'if-empty': { type: 'boolean', default: false },
      light: { type: 'boolean', default: false },
      quiet: { type: 'boolean', default: false },
      participants: { type: 'string', default: String(demoDefaults.participants) },
      seed: { type: 'string', default: String(demoDefaults.seed) },
      now: { type: 'string' },
    },
  });
  const participants = Number(values.participants);
  const seed = Number(values.seed);
  const now = values.now === undefined ? new Date() : new Date(values.now);
  if (!Number.isInteger(participants) || participants < 3 || participants > 25_000) throw new Mendable(`--participants takes a whole number from 3 to 25000, not '${values.participants}'.`);
  if (!Number.isSafeInteger(seed)) throw new Mendable(`--seed takes a whole number, not '${values.seed}'.`);
  if (Number.isNaN(now.getTime())) throw new Mendable(`--now takes a moment such as 2027-03-03T10:40:00Z, not '${values.now}'.`);
  return { ifEmpty: values['if-empty'], light: values.light, quiet: values.quiet, participants, seed, now };
}

async function seed(): Promise<void> {
  const { ifEmpty, quiet, ...options } = readOptions();
  const tell = quiet ? () => {} : console.log;
  const client = new Client({ connectionString: env().OWNER_DATABASE_URL });
  await client.connect();
  try {
    const state = await stateOf(client);
    if (state === 'broken off') throw new Mendable("An earlier seed broke off half-way. Start again with an empty data base: 'npm run db:reset'.");
    if (state === 'seeded' && ifEmpty) return tell('The data base holds the demonstration already; it is left as it is.');
    if (state === 'seeded') throw new Mendable("The data base holds a study already. 'npm run db:reset' starts with an empty one.");
    const startedAt = performance.now();
    await seedStudy(client, options);
    tell(`Seeded 'Steady Lift' with ${options.participants} participants in ${((performance.now() - startedAt) / 1000).toFixed(1)} s.`);
  } finally {
    await client.end();
  }
}

seed().catch((error: unknown) => {
  console.error(error instanceof Mendable ? error.message : error);
  process.exit(1);
});
