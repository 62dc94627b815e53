import { placeInWindow } from '@/instruments/calendar';
import type { Visit } from '@/entities/visit';
import { VisitSchema } from '@/entities/visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A visit as screens show it. */
export interface VisitView {
  readonly id: string;
  readonly participantId: string;
  readonly key: string;
  readonly name: string;
  readonly targetOn: string;
  readonly opensOn: string;
  readonly closesOn: string;
  readonly bookedAt: string | null;
  readonly doneOn: string | null;
  readonly state: Visit['state'];
  readonly missedReason: string | null;
  readonly unscheduledReason: string | null;
  /** Why it took place out of its window. */
  readonly windowReason: string | null;
  /** Where the visit lies against its window; null while it has no date. */
  readonly place: { readonly status: 'in' | 'early' | 'late'; readonly deltaDays: number } | null;
  readonly version: number;
}

export const toVisitView = (visit: Visit): VisitView => ({
  id: visit.id,
  participantId: visit.participantId,
  key: visit.key,
  name: visit.name,
  targetOn: visit.targetOn,
  opensOn: visit.opensOn,
  closesOn: visit.closesOn,
  bookedAt: visit.bookedAt?.toISOString() ?? null,
  doneOn: visit.doneOn ?? null,
  state: visit.state,
  missedReason: visit.missedReason ?? null,
  unscheduledReason: visit.unscheduledReason ?? null,
  windowReason: visit.windowReason ?? null,
  place: visit.doneOn ? placeInWindow(visit, visit.doneOn) : null,
  version: visit.version,
});

/** A visit within reach. @throws Refusal 'not-found'. */
export async function findVisit(work: Work, id: string): Promise<Visit> {
  const visit = await work.em.findOne(VisitSchema, { id });
  if (!visit) throw new Refusal('not-found', 'There is no such visit in your reach.');
  return visit;
}

/** The clock of a site. */
export async function timeZoneOf(work: Work, siteId: string): Promise<string> {
  const [site] = await work.sql<{ time_zone: string }>('select time_zone from site where id = ?', [siteId]);
  return site?.time_zone ?? 'UTC';
}
