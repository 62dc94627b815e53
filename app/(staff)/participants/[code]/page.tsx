import type { Metadata } from 'next';
import { TideChart } from '@/components/chart/tide-chart';
import { AddVisit } from '@/components/participants/add-visit';
import { CorrectFact } from '@/components/participants/correct-fact';
import { ParticipantFacts } from '@/components/participants/participant-facts';
import { ParticipantMargin } from '@/components/participants/participant-margin';
import { armStanding, tideFinding, tideOf } from '@/components/participants/tide-of';
import { VisitsTable } from '@/components/participants/visits-table';
import { ButtonLink } from '@/components/ui/button';
import { Columns, PageHead } from '@/components/ui/page';
import { daysBetween } from '@/instruments/calendar';
import { may } from '@/lib/auth/policy';
import { viewParticipant } from '@/lib/participants/view-participant';
import { loadPage, requireActor } from '@/lib/web/session';

interface Props {
  params: Promise<{ code: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: (await params).code };
}

export default async function ParticipantPage({ params }: Props) {
  const { code } = await params;
  const { role } = await requireActor('participant.view');
  const view = await loadPage('participant.view', (work) => viewParticipant(work, { code }));
  const { today, facts, visits, siteName, state } = view;
  const running = visits.find((visit) => visit.state === 'in progress');
  const month = Math.floor(daysBetween({ from: facts.enrolledOn, to: view.leftOn ?? today }) / 30.4375);
  return (
    <>
      <PageHead
        crumbs={[{ label: 'Participants', href: '/participants' }, { label: siteName }]}
        title={code}
        beside={`${state === 'enrolled' ? `Month ${month} in the study` : `${state} in month ${month}`}, ${armStanding(view)}`}
        actions={
          <>
            {state === 'enrolled' && may(role, 'visit.add') ? <AddVisit code={code} today={today} /> : null}
            {running && may(role, 'visit.begin') ? (
              <ButtonLink kind="primary" href={`/participants/${code}/visits/${running.id}`}>
                Continue {running.name}
              </ButtonLink>
            ) : null}
          </>
        }
      />
      <ParticipantFacts view={view} />
      {may(role, 'participant.correct') ? (
        <p className="mt-2">
          <CorrectFact view={view} />
        </p>
      ) : null}
      <div className="mt-8">
        <TideChart data={tideOf(view)} finding={tideFinding(view)} />
      </div>
      <Columns margin={<ParticipantMargin view={view} mayReadIdentity={may(role, 'identity.view')} />}>
        <h2 className="mb-2">Visits</h2>
        <VisitsTable view={view} mayBook={may(role, 'visit.book')} />
        <p className="t-small mt-3 text-ink-2">
          Change = (affected now × unaffected at baseline) ÷ (unaffected now × affected at baseline) − 1. A research measurement: it is no diagnosis, and it does not replace the clinician’s judgement.
        </p>
      </Columns>
    </>
  );
}
