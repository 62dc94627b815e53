import type { ResultsView } from '@/lib/results/view-results';
import { FlowDiagram, type FlowStage } from '../chart/flow-diagram';
import { Columns, MarginPart } from '../ui/page';
import { countWords, reasonWords } from './words';

type Stage = ResultsView['flow'][number];

/** Two reasons are said under the stage; more are summed there and told one by one in the margin. */
function drawn({ name, people, out }: Stage, next: Stage | undefined): FlowStage {
  const [first, second, ...more] = out?.reasons ?? [];
  if (!out || !first || !next) return { name, people };
  if (more.length > 0) return { name, people, out: { words: `${countWords(people - next.people)} left here`, detail: `most: ${reasonWords([first])}` } };
  return { name, people, out: { words: reasonWords([first]), ...(second ? { detail: reasonWords([second]) } : {}) } };
}

/** Participant flow from screening to the last visit, and how it was counted. */
export function WhoIsInIt({ view }: { view: ResultsView }) {
  const { flow, left, suppressBelow } = view;
  const [first, last] = [flow[0], flow.at(-1)];
  const baseline = flow.find(({ name }) => name === 'Baseline done');
  const finding = first && last
    ? `Of ${countWords(first.people)} people ${first.name.toLowerCase()}, ${baseline ? `${countWords(baseline.people)} completed the baseline and ` : ''}${countWords(last.people)} are counted at ‘${last.name}’.`
    : 'Nobody to show yet.';
  const reasons = flow.find(({ out }) => (out?.reasons.length ?? 0) > 2);
  return (
    <Columns
      computed
      marginLabel="How the participant flow was counted"
      margin={
        <MarginPart title="How this was counted">
          <div className="grid gap-2 text-[13.5px] leading-[19.5px] text-ink-2">
            <p>A stage counts people of the stage before with a complete assessment of both arms at or after that month, up to 45 days early. Who was enrolled too lately is not yet due.</p>
            {left.length > 0 ? <p>Withdrawn since enrolment: {reasonWords(left)}. Their visits until then count.</p> : null}
            {suppressBelow > 0 ? <p>Your role is shown no count from 1 to {suppressBelow - 1}, nor one from which such a count could be had by subtracting a site or a cohort from the whole. Stages that differ by so few are drawn as one.</p> : null}
            {reasons?.out ? (
              <details>
                <summary className="btn-link cursor-pointer">All reasons after ‘{reasons.name}’</summary>
                <ul className="mt-1.5">
                  {reasons.out.reasons.map(({ reason, count }) => (
                    <li key={reason} className="flex justify-between gap-3 border-b border-rule py-1">
                      <span>{reason}</span>
                      <span className="t-num">{countWords(count)}</span>
                    </li>
                  ))}
                </ul>
              </details>
            ) : null}
          </div>
        </MarginPart>
      }
    >
      <h2 className="mb-3">Who is in it</h2>
      {first ? <FlowDiagram finding={finding} stages={flow.map((stage, index) => drawn(stage, flow[index + 1]))} /> : <p className="text-ink-2">{finding}</p>}
    </Columns>
  );
}
