import type { WeekAxis } from '../chart/week-axis';
import { ButtonLink } from './button';
import { Gauge } from './gauge';
import { Bracket, Flag, Notch, PastLimit } from './signs';
import { WorkGroup, WorkRow } from './work-list';

const axis: WeekAxis = { from: '2027-02-08', weeks: 8, today: '2027-03-03' };

function code(words: string) {
  return (
    <a className="code-link" href="#work">
      {words}
    </a>
  );
}

function verb(words: string) {
  return (
    <ButtonLink kind="link" href="#work">
      {words}
    </ButtonLink>
  );
}

/** Today's work, all rows on one axis of eight weeks. */
export function WorkListExamples() {
  return (
    <div className="max-w-[1000px]">
      <WorkGroup title="Past due" count={2} axis={axis} first>
        <WorkRow
          when="17 Feb"
          whenDetail="14 days late"
          late
          kind="Visit"
          code={code('NM-0019')}
          title="Month 6"
          detail="Not done, window closed with no booking."
          axis={axis}
          window={{ opens: '2027-01-20', closes: '2027-02-17' }}
          state={<Gauge state="empty" word="Not done" stacked />}
          action={verb('Give the reason')}
        />
        <WorkRow
          when="24 Feb"
          whenDetail="7 days late"
          late
          kind="Query"
          code={code('NM-0033')}
          title="Month 3, left arm at 20 cm"
          detail="Trials 1.9 cm apart. Asked 10 Feb, Q-0418."
          axis={axis}
          window={{ opens: '2027-02-10', closes: '2027-02-24' }}
          state={<Gauge state="needs" word="Yours to answer" stacked />}
          action={verb('Answer')}
        />
      </WorkGroup>
      <WorkGroup title="Today, Wednesday 3 March" count={2} axis={axis}>
        <WorkRow
          when="10:00"
          whenDetail="under way"
          kind="Visit"
          code={code('NM-0042')}
          title="Month 9"
          detail="Impedance ratio saved, tape open."
          axis={axis}
          window={{ opens: '2027-02-23', target: '2027-03-09', closes: '2027-03-23', appointment: '2027-03-03' }}
          state={<Gauge state="part" word="3 of 6 forms" stacked />}
          action={
            <ButtonLink kind="primary" size="small" href="#work">
              Continue
            </ButtonLink>
          }
        />
        <WorkRow
          when="Mon 8 Mar"
          whenDetail="in 5 days"
          kind="Consent"
          code={code('NM-0022')}
          title="Renew to sheet 3.0"
          detail="Needed before Month 6 on 9 Mar."
          axis={axis}
          window={{ opens: '2027-02-15', neededBy: '2027-03-08' }}
          state={<Gauge state="waiting" word="Sent, not signed" stacked />}
          action={verb('Remind')}
        />
      </WorkGroup>
      <p className="work-key">
        <span>
          <Bracket gone size={20} /> window opens, target, closes; thick is time gone
        </span>
        <span>
          <Notch /> appointment
        </span>
        <span>
          <PastLimit /> past the limit
        </span>
        <span>
          <Flag /> consent needed by
        </span>
      </p>
    </div>
  );
}
