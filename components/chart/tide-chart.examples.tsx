import { TideChart } from './tide-chart';
import type { TideData, TideWeek } from './tide-data';
import { dayNumber, dayOf } from './days';

const presses = [
  80, 80, 80, 120, 120, 60, 160, 160, 160, 0, 0, 0, 160, 160, 160, 200, 100, 200, 200, 320, 240, 240, 240, 120, 240, 280, 280, 0, 0, 0, 0,
  0, 200, 200, 200, 200, 240,
];

function weekly(): TideWeek[] {
  const first = dayNumber('2026-06-22');
  return presses.flatMap((press, index) =>
    press === 0 ? [] : [{ starts: dayOf(first + index * 7), loadsKg: [press, Math.round(press * 1.2), Math.round(press * 0.6)] }],
  );
}

/** Invented data for the demonstration study. */
export const exampleTide: TideData = {
  code: 'NM-0042',
  armWords: ['Left against right,', 'change from', 'baseline, %'],
  from: '2026-06-01',
  to: '2027-07-01',
  today: '2027-03-03',
  errorPercent: 3.1,
  threshold: { percent: 10, words: 'a case if the next visit confirms it' },
  visits: [
    {
      key: 'baseline',
      name: 'Baseline',
      on: '2026-06-09',
      dateWords: '9 Jun 2026',
      changePercent: 0,
      trialsPercent: [-0.7, 0.7],
      impedanceRatio: 1.01,
    },
    {
      key: 'm3',
      name: 'Month 3',
      on: '2026-09-11',
      dateWords: '11 Sep 2026',
      changePercent: 1.4,
      trialsPercent: [0.7, 2.1],
      window: { opens: '2026-08-26', target: '2026-09-09', closes: '2026-09-23' },
      impedanceRatio: 1.02,
    },
    {
      key: 'm6',
      name: 'Month 6',
      on: '2026-12-03',
      dateWords: '3 Dec 2026',
      changePercent: 4,
      trialsPercent: [3.3, 4.7],
      window: { opens: '2026-11-25', target: '2026-12-09', closes: '2026-12-23' },
      impedanceRatio: 1.04,
    },
    {
      key: 'extra',
      name: 'Extra',
      on: '2027-01-21',
      dateWords: '21 Jan 2027',
      changePercent: 7.3,
      trialsPercent: [6.6, 8],
      impedanceRatio: 1.08,
    },
    {
      key: 'm9',
      name: 'Month 9',
      on: '2027-03-03',
      dateWords: 'in progress today',
      changePercent: 5,
      trialsPercent: [4.3, 5.7],
      provisional: true,
      window: { opens: '2027-02-23', target: '2027-03-09', closes: '2027-03-23' },
      impedanceRatio: 1.05,
    },
    {
      key: 'm12',
      name: 'Month 12',
      on: null,
      dateWords: 'opens 19 May',
      changePercent: null,
      window: { opens: '2027-05-19', target: '2027-06-09', closes: '2027-06-30' },
      impedanceRatio: null,
    },
  ],
  symptoms: [
    { on: '2026-10-01', words: ['tightness 2'], signCount: 2 },
    { on: '2026-11-09', words: ['heaviness 3,', 'long drive'], signCount: 3 },
    { on: '2027-01-18', words: ['heaviness 6,', 'arm fuller'], signCount: 6 },
  ],
  exercises: ['Chest press', 'Row', 'Curl'],
  weeks: weekly(),
  pauses: [
    { from: '2026-08-24', to: '2026-09-13', words: ['3 weeks', 'off'] },
    { from: '2026-12-28', to: '2027-01-31', words: ['5 weeks off,', 'back 30 % lower'] },
  ],
  callouts: [{ week: '2026-11-02', words: 'chest press +3 kg in a week, site called' }],
  latest: [
    { exercise: 'Chest press', loadKg: 6 },
    { exercise: 'Row', loadKg: 7 },
    { exercise: 'Curl', loadKg: 3 },
  ],
};

/** The tide chart of one participant. */
export function TideChartExamples() {
  return (
    <TideChart
      data={exampleTide}
      finding="The left arm rose to 7.3 % above baseline in January and stands at 5.0 % today, provisional, below high water."
    />
  );
}
