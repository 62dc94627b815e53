import type { ParticipantView } from '@/lib/participants/view-participant';
import { formatDate, formatNearDate } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { MarginPart } from '../ui/page';
import { RevealIdentity } from './reveal-identity';

/** What comes next, soonest first. */
function nextSteps({ visits, trainingHeld, today, state }: ParticipantView): { when: string; what: string }[] {
  if (state !== 'enrolled') return [];
  const open = visits.reduce((sum, { openQueries }) => sum + openQueries, 0);
  const steps = visits
    .filter((visit) => visit.state === 'to come')
    .slice(0, 2)
    .map(({ name, opensOn, closesOn, bookedAt }) =>
      closesOn < today
        ? { when: 'Past due', what: `${name}: the window closed ${formatDate(closesOn)}. Give the reason.` }
        : opensOn <= today
          ? { when: 'Now', what: `${name}${bookedAt ? ' is booked' : ': book it'}; the window closes ${formatDate(closesOn)}.` }
          : { when: formatDate(opensOn), what: `${name} window opens.` },
    );
  const running = visits.find((visit) => visit.state === 'in progress');
  return [
    ...(running ? [{ when: 'Today', what: `Finish ${running.name}.` }] : []),
    ...(trainingHeld ? [{ when: 'Now', what: 'Training is held until the report is reviewed.' }] : []),
    ...(open > 0 ? [{ when: 'Now', what: open === 1 ? 'One query is open.' : `${open} queries are open.` }] : []),
    ...steps,
  ];
}

const modes: Record<string, string> = { tablet: 'on the tablet', home: 'at home', paper: 'on paper' };

/** Next steps, consent, and the way to name and contact for those who may. */
export function ParticipantMargin({ view, mayReadIdentity }: { view: ParticipantView; mayReadIdentity: boolean }) {
  const { consent, code, state, leftOn, leftGrade, timeZone } = view;
  const steps = nextSteps(view);
  return (
    <>
      <MarginPart title="Next steps">
        {steps.length === 0 ? <p className="text-ink-2">{state === 'enrolled' ? 'Nothing is due.' : `No more is asked: ${state}${leftOn ? ` on ${formatDate(leftOn)}` : ''}.`}</p> : null}
        <dl>
          {steps.map(({ when, what }) => (
            <div key={what} className="grid grid-cols-[84px_1fr] gap-2 border-b border-rule py-2">
              <dt className="font-semibold">{when}</dt>
              <dd>{what}</dd>
            </div>
          ))}
        </dl>
      </MarginPart>
      <MarginPart title="Consent">
        {consent ? (
          <>
            <Gauge state={state === 'withdrawn' ? 'closed' : 'done'} word={state === 'withdrawn' ? `Withdrawn: ${leftGrade ?? ''}` : `Valid, form ${consent.number}`} />
            <p className="t-small mt-2 text-ink-2">
              {consent.signedAt ? `Complete ${formatNearDate(new Date(consent.signedAt), timeZone)} ${formatDate(new Date(consent.signedAt), timeZone).slice(-4)}` : 'Complete'}, {modes[consent.mode] ?? consent.mode}.
            </p>
          </>
        ) : (
          <Gauge state="needs" word="No complete consent" />
        )}
      </MarginPart>
      {mayReadIdentity ? (
        <MarginPart title="Name and contact">
          <RevealIdentity code={code} />
        </MarginPart>
      ) : null}
    </>
  );
}
