import { viewIdentity, type IdentityView } from '@/lib/enrolment/view-identity';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** Name and contact behind a code, for the own site; the reading is written to the trail. @throws Refusal 'not-found' out of reach. */
export async function revealIdentity(work: Work, { code }: { code: string }): Promise<IdentityView> {
  const [found] = await work.sql<{ id: string }>('select k.id from screening k join participant p on p.id = k.participant_id where p.code = ?', [code]);
  if (!found) throw new Refusal('not-found', 'There is no such participant in your reach.');
  return viewIdentity(work, { id: found.id });
}
