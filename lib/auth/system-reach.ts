import { withWork } from '@/lib/work/with-work';
import { systemActor, type Actor } from './roles';

/** The system with every site in reach: for unattended work across the study. */
export async function systemEverywhere(): Promise<Actor> {
  const sites = await withWork(systemActor(), 'session.check', (work) => work.sql<{ id: string }>('select id from site'));
  return systemActor(sites.map(({ id }) => id));
}
