import type { ResultsView } from '@/lib/results/view-results';
import { SurvivalChart, type Curve } from '../chart/survival-chart';
import { formatPercent, formatSigned } from '../ui/format';
import { Columns, MarginPart } from '../ui/page';
import { PlainTable } from '../ui/plain-table';
import { countWords, limitWords, reasonWords, shareWords } from './words';

type Incidence = ResultsView['incidence'][number];

function curveOf({ sentence, steps, lastMonth, atRisk }: Incidence, label: string, isConfirmed: boolean): Curve {
  return {
    label,
    definition: isConfirmed ? `${sentence.replace(/\.$/, '')}, met again at the next scheduled visit.` : sentence,
    steps: steps.map(({ month, share, lower, upper }) => ({ time: month, share, lower, upper })),
    lastTime: lastMonth,
    atRisk,
  };
}

/** What the two curves say at one year, in one sentence. */
function findingOf([a, b]: ResultsView['incidence']): string {
  const at = (view: Incidence) => view.at.find(({ months }) => months === 12);
  const say = (view: Incidence, label: string) => {
    const read = at(view);
    return read?.share == null ? `no share can be given by definition ${label} (${read?.reason ?? 'nobody followed'})` : `${formatPercent(read.share)} had swelling by definition ${label}`;
  };
  return `By 12 months ${say(a, 'A')} and ${say(b, 'B')}, among ${countWords(a.n)} and ${countWords(b.n)} people.`;
}

function LeftOut({ label, view }: { label: string; view: Incidence }) {
  return (
    <p>
      {label}, {view.name}: {countWords(view.n)} people, {countWords(view.events)} with swelling.{view.leftOut.length > 0 ? ` Left out: ${reasonWords(view.leftOut)}.` : ' Nobody left out.'}
    </p>
  );
}

/** Cumulative incidence by two definitions side by side, read off at months in a table. */
export function Swelling({ view }: { view: ResultsView }) {
  const [a, b] = view.incidence;
  const isConfirmed = view.confirmation !== 'first visit';
  // The drawing reads its own steps: where the share may not be said, it is not read off either.
  const isReadable = [a, b].every(({ at }) => at.some(({ months, share }) => months === 12 && share !== null));
  const rows = a.at.map((read, index) => ({ a: read, b: b.at[index] ?? read }));
  return (
    <Columns
      computed
      marginLabel="How swelling was computed"
      margin={
        <MarginPart title="How this was computed">
          <div className="grid gap-2 text-[13.5px] leading-[19.5px] text-ink-2">
            <p>One minus the survival curve, from the baseline visit. {a.method}. Bands are pointwise 95 % intervals.</p>
            <LeftOut label="A" view={a} />
            <LeftOut label="B" view={b} />
            {[...a.notes, ...b.notes].map((note) => (
              <p key={note}>{note}</p>
            ))}
            <p>The date of swelling is the visit it was first seen, so the steps gather at visits. Those who left are taken to be like those who stayed; nobody is recorded as having died before swelling, so no competing event is handled.</p>
            {view.chosen.cohort === undefined && view.cohorts.length > 1 ? <p className="is-margin">Every cohort is counted together, also people who lived with swelling when they joined, in whom a rise counts as well. For the incidence of new swelling choose the cohort at risk.</p> : null}
            <p>Both panels share one scale. The dashes in B repeat A. A month is 30.4 days.</p>
            {view.suppressBelow > 0 ? <p>Your role is shown no count from 1 to {view.suppressBelow - 1}, none from which one could be had by subtraction, and no share that rests on one: the first {view.suppressBelow} people with swelling are drawn as one step, and a curve ends where fewer than {view.suppressBelow} are followed. A dash stands for a count that is not shown.</p> : null}
            <p className="text-[12.5px]">{a.reference}.</p>
            <p className="text-note">This is a group without a comparison arm. It cannot say that lifting causes or prevents swelling.</p>
          </div>
        </MarginPart>
      }
    >
      <h2 className="mb-3">Swelling, as time goes on</h2>
      <SurvivalChart
        curves={[curveOf(a, 'A', isConfirmed), curveOf(b, 'B', isConfirmed)]}
        riskTimes={view.riskMonths}
        timeUnit="months"
        {...(isReadable ? { readAt: 12 } : {})}
        riskWords="still followed, without swelling"
        eventWords="swelling"
        finding={findingOf(view.incidence)}
      />
      <div className="mt-5">
        <PlainTable
          caption="Share with swelling by month"
          rows={rows}
          getRowId={({ a: { months } }) => String(months)}
          columns={[
            { id: 'by', header: 'Share with swelling by', cell: (row) => `${row.a.months} months` },
            { id: 'a', header: 'A', numeric: true, cell: (row) => shareWords(row.a.share, row.a.reason) },
            { id: 'a-limits', header: 'A, 95 % interval', numeric: true, cell: (row) => limitWords(row.a.lower, row.a.upper) },
            { id: 'b', header: 'B', numeric: true, cell: (row) => shareWords(row.b.share, row.b.reason) },
            { id: 'b-limits', header: 'B, 95 % interval', numeric: true, cell: (row) => limitWords(row.b.lower, row.b.upper) },
            { id: 'less', header: 'B less A', numeric: true, cell: ({ a: { share: inA }, b: { share: inB } }) => (inA === null || inB === null ? '' : `${formatSigned((inB - inA) * 100)} points`) },
            { id: 'people', header: 'People counted', numeric: true, cell: (row) => `${countWords(row.a.events)} and ${countWords(row.b.events)}` },
          ]}
        />
      </div>
    </Columns>
  );
}
