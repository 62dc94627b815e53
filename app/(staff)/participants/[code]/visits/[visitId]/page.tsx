import type { Metadata } from 'next';
import { ReviewSheet } from '@/components/margin/review-sheet';
import { countSeen, keyOfTarget, partsOfReview } from '@/components/margin/review-items';
import { VisitSteps } from '@/components/margin/visit-steps';
import { ButtonLink } from '@/components/ui/button';
import { countOf, formatDate, formatDateRange, formatMoment } from '@/components/ui/format';
import { Gauge } from '@/components/ui/gauge';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { viewReview, type ReviewView } from '@/lib/review/view-review';
import { loadPage, requireSession } from '@/lib/web/session';

type Props = { params: Promise<{ code: string; visitId: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Visit of ${(await params).code}` };
}

export default async function Page({ params }: Props) {
  const { code, visitId } = await params;
  const view = await loadPage('visit.view', (work) => viewReview(work, { code, visitId }));
  const { actor } = await requireSession();
  const { visit, assessment } = view;
  const mayDo = (act: Parameters<typeof may>[1]) => may(actor.role, act);
  const seen = countSeen(partsOfReview(view), new Set(view.marks.map(keyOfTarget)));
  const waiting = view.queries.filter(({ state }) => state === 'open' || state === 'answered').length;
  const limbHref = `/participants/${code}/visits/${visit.id}/limb`;
  return (
    <>
      <PageHead
        title={assessment ? 'Limb and questionnaires' : visit.name}
        crumbs={[{ label: code, href: `/participants/${code}` }, { label: visit.name }]}
        lede={ledeOf(view)}
        actions={
          assessment ? (
            <>
              <Gauge state={seen.seen === seen.of ? 'done' : seen.seen === 0 ? 'empty' : 'part'} level={seen.of ? seen.seen / seen.of : 0} size={84} word={`${seen.seen} of ${seen.of} seen at source`} />
              {waiting > 0 ? <span className="t-small text-ink-2">{countOf(waiting, 'query', 'queries')} to close</span> : null}
              <ButtonLink href={limbHref}>See the arms and the result</ButtonLink>
            </>
          ) : null
        }
      />
      <VisitSteps
        visit={visit}
        limbHref={limbHref}
        isUnderWay={view.underWay !== null}
        rights={{ measure: mayDo('assessment.begin'), book: mayDo('visit.book'), miss: mayDo('visit.miss'), end: mayDo('visit.complete'), undo: mayDo('visit.correct') }}
        today={view.today}
      />
      <ReviewSheet
        view={view}
        rights={{
          mark: mayDo('verification.mark'),
          raise: mayDo('query.raise'),
          answer: mayDo('query.answer'),
          close: mayDo('query.close'),
          correct: mayDo('assessment.correct') && assessment !== null,
        }}
      />
    </>
  );
}

/** When the visit was, where that lies in its window, and by whom it was entered. */
function ledeOf({ visit, assessment, underWay, assessorLabel, participant }: ReviewView): string {
  const window = `window ${formatDateRange(visit.opensOn, visit.closesOn)}`;
  const booked = visit.bookedAt ? `, booked for ${formatMoment(new Date(visit.bookedAt), participant.timeZone)}` : '';
  const why = visit.unscheduledReason ? ` Unscheduled visit: ${visit.unscheduledReason}` : '';
  if (visit.state === 'missed') return `Missed: ${visit.missedReason ?? ''}. The ${window}.`;
  if (!visit.doneOn) return `To come, ${window}${booked}.${why}`;
  const entered = assessment && assessorLabel ? ` Entered by ${assessorLabel}.` : underWay ? ` Being measured: ${countOf(underWay.passes, 'pass', 'passes')} of four saved.` : '';
  const outside = visit.windowReason ? ` Out of window: ${visit.windowReason}` : '';
  return `${formatDate(visit.doneOn)}, ${placeWords(visit)}.${entered}${outside}${why}`;
}

function placeWords({ place, opensOn, closesOn }: ReviewView['visit']): string {
  if (!place) return '';
  const { status, deltaDays } = place;
  const target = deltaDays === 0 ? 'on the target day' : `${countOf(Math.abs(deltaDays), 'day')} ${deltaDays < 0 ? 'before' : 'after'} target`;
  if (status === 'in') return `in window, ${target}`;
  return `${status} for the window ${formatDateRange(opensOn, closesOn)}, ${target}`;
}
