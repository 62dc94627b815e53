import { undoBegin as undo } from '@/entities/visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findVisit, toVisitView, type VisitView } from './view-visit';

const written = `select 1 from limb_assessment a where a.visit_id = ? and (a.state = 'complete' or exists (select from limb_trial t where t.assessment_id = a.id)
  or num_nonnulls(a.position, a.sleeve_worn, a.hours_since_training, a.body_weight_g, a.impedance_ratio, a.impedance_rest_min, a.remarks) > 0)`;

/**
 * A visit that was begun by mistake is to come again; that it was begun, and why not, stays in the trail.
 * @throws Refusal 'conflict' once anything was written down at it, or when it is not in progress.
 */
export async function undoBegin(work: Work, { id }: { id: string; reason: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  const [some] = await work.sql(written, [id]);
  if (some) throw new Refusal('conflict', 'Something was written down at this visit, so it took place. Correct its day or its values instead.');
  undo(visit);
  await work.em.flush();
  return toVisitView(visit);
}
