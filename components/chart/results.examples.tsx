import { FlowDiagram } from './flow-diagram';
import { LoadBandsChart } from './load-bands-chart';
import { SurvivalChart, type Curve } from './survival-chart';
import { ShareBar } from './small-charts';

const steps = (shares: readonly (readonly [number, number, number, number])[]) =>
  shares.map(([time, share, lower, upper]) => ({ time, share, lower, upper }));

/* Invented curves; the limits are drawn, not estimated. */
const curves: readonly Curve[] = [
  {
    label: 'A',
    definition: 'Volume change of 10 % or more, seen again at the next visit.',
    lastTime: 18,
    atRisk: [142, 113, 96, 81, 52, 39, 21],
    steps: steps([
      [2.7, 0.021, 0.007, 0.064],
      [3.0, 0.043, 0.019, 0.093],
      [3.3, 0.06, 0.029, 0.121],
      [5.8, 0.079, 0.042, 0.147],
      [9.1, 0.091, 0.05, 0.164],
      [15.2, 0.141, 0.076, 0.252],
    ]),
  },
  {
    label: 'B',
    definition: 'Volume change of 5 % or more, seen again at the next visit.',
    lastTime: 18,
    atRisk: [142, 111, 92, 74, 45, 36, 19],
    steps: steps([
      [2.7, 0.034, 0.014, 0.081],
      [3.1, 0.076, 0.041, 0.142],
      [5.9, 0.12, 0.07, 0.19],
      [6.2, 0.135, 0.082, 0.215],
      [8.8, 0.19, 0.125, 0.28],
      [9.2, 0.227, 0.156, 0.323],
      [12, 0.243, 0.168, 0.344],
      [15, 0.281, 0.197, 0.393],
    ]),
  },
];

/** Two definitions side by side on one scale. */
export function SurvivalExamples() {
  return (
    <SurvivalChart
      curves={curves}
      riskTimes={[0, 3, 6, 9, 12, 15, 18]}
      timeUnit="months"
      readAt={12}
      riskWords="still followed, without swelling"
      eventWords="swelling"
      finding="By 12 months 9.1 % had swelling by definition A and 24.3 % by definition B, among 142 people."
    />
  );
}

/** Participant flow. */
export function FlowExamples() {
  return (
    <FlowDiagram
      finding="Of 231 people assessed, 142 completed the baseline and 55 have been seen at Month 12."
      stages={[
        { name: 'Assessed', people: 231, out: { words: '55 not eligible', detail: '38 no surgery date in range, 17 other' } },
        { name: 'Eligible', people: 176, out: { words: '28 said no' } },
        { name: 'Consented', people: 148, out: { words: '6 left before baseline' } },
        { name: 'Baseline done', people: 142, out: { words: '31 not yet due', detail: '5 missed, 2 withdrew' } },
        { name: 'Month 6 seen', people: 104, out: { words: '41 not yet due', detail: '5 missed, 3 withdrew' } },
        { name: 'Month 12 seen', people: 55 },
      ]}
    />
  );
}

const weeks = Array.from({ length: 52 }, (_, index) => {
  const median = 1.8 + 3.7 * (1 - Math.exp(-index / 22));
  return {
    week: index + 1,
    p10: median * 0.72,
    p25: median * 0.84,
    p50: median,
    p75: median * 1.28,
    p90: median * 1.7,
    people: 139 - index * 2,
  };
});

/** Load by week as quantile bands, and the rule as shares. */
export function LoadBandsExamples() {
  return (
    <div className="grid gap-10 lg:grid-cols-[3fr_2fr]">
      <LoadBandsChart
        weeks={weeks}
        label="Chest press, heaviest set of the week"
        firstLoadKg={[1, 2]}
        finding="Half of those training lifted at least 5.1 kg by week 52, from 1.8 kg in week 1."
      />
      <div>
        <ShareBar words="Held, or up by 2 kg or less" count={3413} of={3593} />
        <ShareBar words="Up more than 2, under 5 kg" count={171} of={3593} outside />
        <ShareBar words="Up 5 kg or more" count={9} of={3593} outside />
      </div>
    </div>
  );
}
