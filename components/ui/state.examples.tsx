import { ButtonLink } from './button';
import { Caution, UrgentRow } from './caution';
import { Gauge } from './gauge';
import { Neatline } from './neatline';
import { Bracket, Buoy, CutLine, Dash, Diamond, DoneTick, Flag, Mark, Notch, PastLimit, SealedLine, Tick } from './signs';
import { BrokenProof, Empty, Loading, Waterlines } from './waiting';

/** Every state of the level. */
export function GaugeExamples() {
  return (
    <div className="flex flex-wrap gap-x-9 gap-y-5">
      <Gauge state="empty" word="Not begun" />
      <Gauge state="part" level={0.5} word="3 of 6 forms" rises />
      <Gauge state="waiting" word="Sent, not signed" />
      <Gauge state="needs" word="Yours to answer" />
      <Gauge state="part" level={18 / 21} size={84} word="18 of 21 seen at source" />
      <Gauge state="done" word="Verified" />
      <Gauge state="closed" word="Closed to change" />
      <Gauge state="empty" word="Missed, reason kept" />
      <Gauge state="needs" level={0.1} word="Not yet read" stacked />
    </div>
  );
}

/** Our own signs with their words. */
export function SignExamples() {
  const signs = [
    { word: 'mark', node: <Mark size={26} /> },
    { word: 'caution', node: <Buoy size={26} /> },
    { word: 'seen at source', node: <Tick /> },
    { word: 'done', node: <DoneTick /> },
    { word: 'not yet', node: <Dash /> },
    { word: 'appointment, actual', node: <Notch /> },
    { word: 'now', node: <Notch now /> },
    { word: 'needed by', node: <Flag /> },
    { word: 'window and target', node: <Bracket /> },
    { word: 'past the limit', node: <PastLimit /> },
    { word: 'measured', node: <Diamond /> },
    { word: 'provisional', node: <Diamond provisional /> },
    { word: 'sealed days', node: <SealedLine /> },
    { word: 'cut line', node: <CutLine /> },
  ];
  return (
    <ul className="flex flex-wrap gap-x-10 gap-y-5">
      {signs.map(({ word, node }) => (
        <li key={word} className="t-small text-ink-2">
          <span className="flex h-[30px] items-center">{node}</span>
          {word}
        </li>
      ))}
    </ul>
  );
}

/** The caution, and the urgent report above the work list. */
export function CautionExamples() {
  return (
    <div className="grid max-w-[1000px] gap-6">
      <Caution title="Hot, red, suddenly swollen arm or fever: seek urgent care.">
        This log does not replace your clinician’s advice.
      </Caution>
      <UrgentRow
        title={
          <>
            <a className="code-link mr-2.5" href="#cautions">
              NM-0057
            </a>
            <b>says the arm is hot and red, with fever since last night.</b> Reported 07:52, 2 h 48 min ago.
          </>
        }
        action={
          <ButtonLink kind="primary" href="#cautions">
            Review the report
          </ButtonLink>
        }
      >
        The phone has already shown: seek urgent care now. Training is held. Call, then record what was done, by 11:52.
      </UrgentRow>
    </div>
  );
}

/** Study time under a page head. */
export function NeatlineExamples() {
  return <Neatline segments={48} gone={0.455} />;
}

/** Empty, waiting, broken. */
export function WaitingExamples() {
  return (
    <div className="grid gap-x-11 gap-y-6 sm:grid-cols-2">
      <Empty title="No queries wait on you" action={<a href="#waiting">See all 11 at other sites</a>}>
        The last was closed on 1 Mar 2027. New ones appear here and under Today.
      </Empty>
      <Loading title="Working out the results" detail="snapshot S-0118, 61 of 142 people" level={0.43}>
        About 20 seconds. You can leave this page.
      </Loading>
      <Waterlines />
      <BrokenProof title="The line is cut at 18 Feb 2027">
        Entry 47 540 does not match its seal. Nothing after it is proven. Releases are stopped and R-01 has been told.
      </BrokenProof>
    </div>
  );
}
