import { SiteSchema } from '@/entities/site';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** What the form that opens a screening offers. */
export interface OpeningView {
  readonly cohorts: readonly { readonly value: string; readonly label: string }[];
  readonly sites: readonly { readonly value: string; readonly label: string }[];
  readonly today: string;
}

/** The cohorts of the protocol in effect, and the sites in reach. */
export async function viewOpening(work: Work): Promise<OpeningView> {
  const sites = await work.em.find(SiteSchema, { id: { $in: [...work.actor.reach] } }, { orderBy: { name: 'asc' } });
  const zone = sites[0]?.timeZone ?? 'UTC';
  const { document } = await currentProtocol(work, zone);
  return {
    cohorts: document.cohorts.map(({ key, name }) => ({ value: key, label: name })),
    sites: sites.map(({ id, name }) => ({ value: id, label: name })),
    today: localDate(work.now, zone),
  };
}
