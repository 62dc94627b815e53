import type { ResultsView } from '@/lib/results/view-results';
import { LoadBandsChart } from '../chart/load-bands-chart';
import { ShareBar } from '../chart/small-charts';
import { countOf, formatLoadKg, formatPercent } from '../ui/format';
import { Columns, MarginPart } from '../ui/page';
import { countWords, limitWords } from './words';

type Load = ResultsView['loads'][number];
type Adherence = ResultsView['adherence'];

/** The last week of which a finding may speak: at least a fifth of the most who ever trained in one, and ten people. Common practice, no source. */
function lastTold(weeks: Load['weeks']): Load['weeks'][number] | undefined {
  const most = Math.max(0, ...weeks.map(({ people }) => people));
  return weeks.findLast(({ people }) => people >= 10 && people >= most / 5) ?? weeks.at(-1);
}

function findingOf({ weeks }: Load): string {
  const [first, last] = [weeks[0], lastTold(weeks)];
  return first && last ? `In week ${last.week} half of the ${last.people} people training lifted ${formatLoadKg(last.p50)} or more; in week ${first.week}, ${formatLoadKg(first.p50)} or more of ${first.people}.` : '';
}

function OneLoad({ load, firstLoadKg, isFirst }: { load: Load; firstLoadKg: ResultsView['firstLoadKg']; isFirst: boolean }) {
  const label = `${load.name}, kg, heaviest set of the week (${load.equipment}, ${load.basis})`;
  const chart = (
    <>
      <p className="t-small mb-2 text-ink-2">{label}</p>
      {load.weeks.length > 1 ? <LoadBandsChart weeks={load.weeks} label={label} finding={findingOf(load)} firstLoadKg={firstLoadKg} /> : <p className="text-ink-2">Too few people have logged it for quantiles.</p>}
      {load.otherEquipment > 0 ? <p className="t-small mt-1 text-ink-2">{countOf(load.otherEquipment, 'weekly load')} with other equipment left out: kilograms do not compare.</p> : null}
    </>
  );
  if (isFirst) return chart;
  return (
    <details className="mt-3 border-t border-rule pt-3">
      <summary className="btn-link cursor-pointer">{load.name}</summary>
      <div className="mt-3">{chart}</div>
    </details>
  );
}

function Shares({ adherence }: { adherence: Adherence }) {
  const { kept, broken, weeks } = adherence;
  if (weeks === 0) return <p className="text-ink-2">No training week is logged yet.</p>;
  const bar = (words: string, share: Adherence['kept'], outside?: true) =>
    share.count === null || weeks === null ? (
      <div key={words} className="border-b border-rule py-2">
        <p>{words}</p>
        <p className="t-num text-ink-2">not shown</p>
      </div>
    ) : (
      <ShareBar key={words} words={words} count={share.count} of={weeks} {...(outside ? { outside } : {})} />
    );
  return (
    <>
      {bar('No rule of progression broken', kept)}
      {kept.share === null ? null : (
        <p className="t-small mt-1.5 text-ink-2">
          {formatPercent(kept.share)}, 95 % interval {limitWords(kept.lower, kept.upper)}
        </p>
      )}
      <p className="mt-5 text-ink-2">Weeks in which a rule was broken</p>
      {broken.map((one) => bar(one.title, one, true))}
    </>
  );
}

/** Load by week as quantile bands, and how the rule was kept. */
export function LoadAndRules({ view }: { view: ResultsView }) {
  const { loads, adherence } = view;
  const [first] = loads;
  return (
    <Columns
      computed
      marginLabel="How loads and rules were computed"
      margin={
        <MarginPart title="How this was computed">
          <div className="grid gap-2 text-[13.5px] leading-[19.5px] text-ink-2">
            {first ? <p>{first.method}. Each person counts once a week with the heaviest set; weeks count from the person’s own first session. A week is drawn while five people trained in it.</p> : null}
            <p>A week without a session leaves that person out of it. These are not growth curves: who is left in a late week differs from who began.</p>
            <p>
              {adherence.method}: {countWords(adherence.weeks)} calendar weeks with a session, {countWords(adherence.people)} people. A week counts against a rule once, however often it was broken; one week may break several.
            </p>
            <p>Rules are judged by the protocol version of the time, from what people logged themselves.</p>
            <p className="text-note">This is a group without a comparison arm. It cannot say which load is right for anybody; that stays with their clinician.</p>
          </div>
        </MarginPart>
      }
    >
      <div className="grid gap-x-12 gap-y-8 lg:grid-cols-[3fr_2fr]">
        <section className="min-w-0">
          <h2>Load, week by week</h2>
          {loads.length === 0 ? <p className="mt-2 text-ink-2">No load is logged yet.</p> : loads.map((load, index) => <OneLoad key={load.exercise} load={load} firstLoadKg={view.firstLoadKg} isFirst={index === 0} />)}
        </section>
        <section className="min-w-0">
          <h2>Keeping to the rule</h2>
          <p className="t-small mb-1 text-ink-2">Training weeks, all exercises</p>
          <Shares adherence={adherence} />
        </section>
      </div>
    </Columns>
  );
}
