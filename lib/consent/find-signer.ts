import { AccountSchema } from '@/entities/account';
import type { Work } from '@/lib/work/work';

/** Who would sign second now. */
export interface Signer {
  /** As the account holds it; null when it holds none. */
  readonly name: string | null;
  readonly label: string;
}

/** The name and code of the account in use. */
export async function findSigner(work: Work): Promise<Signer> {
  const account = await work.em.findOne(AccountSchema, { id: work.actor.accountId });
  return { name: account?.name ?? null, label: work.actor.label };
}
