import type { FieldTarget } from '@/lib/queries/targets';
import { findTarget } from '@/lib/queries/targets';
import { Refusal } from '@/lib/work/refusal';
import { VerificationSchema } from '@/entities/verification';
import type { Work } from '@/lib/work/work';

/** A mark as the gutter shows it. */
export interface MarkView {
  readonly table: string;
  readonly id: string;
  readonly field: string;
  readonly label: string;
  readonly at: string;
}

/** A value as the monitor had it on the screen. */
export interface SeenValue extends FieldTarget {
  readonly value: unknown;
}

/**
 * A monitor has seen the values at source. A mark stands on the value and falls, in the data base, when the value changes.
 * @throws Refusal 'stale' when a value is no longer the one that was on the screen.
 */
export async function markVerified(work: Work, { targets }: { targets: readonly SeenValue[] }): Promise<{ marked: number }> {
  let marked = 0;
  for (const target of targets) {
    const found = await findTarget(work, target);
    if (JSON.stringify(found.value) !== JSON.stringify(target.value))
      throw new Refusal('stale', `${found.label} changed since this page was loaded. Load it again, then look at the source.`);
    const standing = await work.em.findOne(VerificationSchema, { targetId: target.id, field: target.field, fellAt: null });
    if (standing) continue;
    work.em.create(VerificationSchema, {
      siteId: found.siteId,
      participantId: found.participantId,
      visitId: found.visitId,
      targetTable: found.table,
      targetId: found.id,
      field: found.field,
      value: found.value,
      verifiedBy: work.actor.accountId,
      verifiedLabel: work.actor.label,
      verifiedAt: work.now,
    });
    marked += 1;
  }
  return { marked };
}
