import PgBoss from 'pg-boss';
import type { Client } from 'pg';
import { consentCopy } from '@/lib/jobs/handlers/consent-copy';
import { queueSchema } from '@/lib/jobs/queues';

/** Behind everything that happens in the running demonstration. */
const priority = -10;

/**
 * Asks the worker for the participant's copy of every complete consent of the demonstration, without a letter:
 * these consents were signed in an invented past. Paper forms are left out, the demonstration has no scans.
 */
export async function askForCopies(client: Client): Promise<void> {
  const { rows } = await client.query<{ id: string; site_id: string }>(`select id, site_id from consent where state = 'complete' and mode <> 'paper' order by participant_signed_at`);
  const queue = new PgBoss({ schema: queueSchema, db: { executeSql: (text, values) => client.query(text, values) } });
  await queue.insert(rows.map(({ id, site_id }) => ({ name: consentCopy.name, priority, data: consentCopy.payload.parse({ siteId: site_id, consentId: id, letter: 'none' }) })));
}
