import { swellingDefinition } from '@/instruments/swelling';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import type { Work } from '@/lib/work/work';

/** What the list of participants can be narrowed by. */
export interface ParticipantChoices {
  readonly sites: readonly { readonly id: string; readonly name: string }[];
  readonly cohorts: readonly { readonly key: string; readonly name: string }[];
  /** Name of the definition of swelling that the protocol puts first. */
  readonly primaryName: string;
}

/** Sites in reach, cohorts of the protocol in force. */
export async function listChoices(work: Work): Promise<ParticipantChoices> {
  const { document } = await currentProtocol(work);
  const sites = await work.sql<{ id: string; name: string }>('select id, name from site where id = any (?::uuid[]) order by name', [`{${work.actor.reach.join(',')}}`]);
  return { sites, cohorts: document.cohorts, primaryName: swellingDefinition(document.swelling.primary).name };
}
