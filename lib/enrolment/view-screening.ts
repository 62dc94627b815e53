import { AccountSchema } from '@/entities/account';
import { ParticipantSchema } from '@/entities/participant';
import type { Screening } from '@/entities/screening';
import { SiteSchema } from '@/entities/site';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { findScreening, listCriteria, type CriterionView } from './find-screening';

/** A screening without anything that identifies the person. */
export interface ScreeningView {
  readonly id: string;
  readonly version: number;
  readonly number: number;
  readonly site: { readonly id: string; readonly code: string; readonly name: string; readonly timeZone: string };
  readonly screenedOn: string;
  readonly cohort: { readonly key: string; readonly name: string };
  readonly referredBy: string | null;
  readonly state: Screening['state'];
  readonly notEnrolledReason: string | null;
  readonly notEnrolledNote: string | null;
  readonly protocolNumber: string;
  readonly criteria: readonly CriterionView[];
  readonly eligibility: { readonly confirmedAt: Date; readonly confirmedBy: string } | null;
  readonly participantCode: string | null;
  /** Today where the site is. */
  readonly today: string;
}

/** One screening in reach. @throws Refusal 'not-found'. */
export async function viewScreening(work: Work, { id }: { id: string }): Promise<ScreeningView> {
  const screening = await findScreening(work, id);
  const site = await work.em.findOneOrFail(SiteSchema, { id: screening.siteId });
  const protocol = await findProtocol(work, screening.protocolVersionId);
  const confirmer = screening.eligibilityConfirmedBy ? await work.em.findOne(AccountSchema, { id: screening.eligibilityConfirmedBy }) : null;
  const participant = screening.participantId ? await work.em.findOne(ParticipantSchema, { id: screening.participantId }) : null;
  const cohort = protocol.document.cohorts.find(({ key }) => key === screening.cohort);
  return {
    id: screening.id,
    version: screening.version,
    number: screening.number,
    site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone },
    screenedOn: screening.screenedOn,
    cohort: { key: screening.cohort, name: cohort?.name ?? screening.cohort },
    referredBy: screening.referredBy ?? null,
    state: screening.state,
    notEnrolledReason: screening.notEnrolledReason ?? null,
    notEnrolledNote: screening.notEnrolledNote ?? null,
    protocolNumber: protocol.number,
    criteria: await listCriteria(work, id, protocol.document),
    eligibility: screening.eligibilityConfirmedAt ? { confirmedAt: screening.eligibilityConfirmedAt, confirmedBy: confirmer?.label ?? '' } : null,
    participantCode: participant?.code ?? null,
    today: localDate(work.now, site.timeZone),
  };
}
