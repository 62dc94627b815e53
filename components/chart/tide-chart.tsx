import { PlainTable } from '../ui/plain-table';
import { formatNumber, formatSigned } from '../ui/format';
import { ScaleBar } from '../ui/staff';
import { ChartFigure } from './chart-figure';
import { monthName, monthStarts } from './days';
import { Patterns, usePatterns } from './patterns';
import { measuredVisits, TideArm } from './tide-arm';
import type { TideData } from './tide-data';
import { TideLoad } from './tide-load';
import { field, tideScale, type TideScale } from './tide-scale';
import { footVisits, TideFoot, TideSymptoms } from './tide-visits';

export interface TideChartProps {
  data: TideData;
  /** One sentence: 'The left arm rose to 7.3 % above baseline in January and is at 5.0 % today, below high water.' */
  finding: string;
}

/** Arm above, load hanging below, windows at the foot, one time axis. */
export function TideChart({ data, finding }: TideChartProps) {
  const ids = usePatterns();
  const scale = tideScale(data);
  const foot = footVisits(data.visits, scale);
  const height = 672 + (foot.some(({ step }) => step === 1) ? 36 : 0);
  return (
    <ChartFigure
      label={`Tide chart for ${data.code}`}
      finding={finding}
      least={1080}
      reading="Each diamond is a visit; the upright through it joins its two trials. Bars hang from the line: the deeper, the more lifted that week."
      table={<TideTables data={data} />}
    >
      <svg width="100%" className="max-w-[1440px]" viewBox={`0 0 ${field.width} ${height}`} role="img" aria-label={finding}>
        <Patterns ids={ids} />
        <TimeAxis data={data} scale={scale} />
        <rect
          x={Math.min(field.right, scale.today)}
          y="29"
          width={Math.max(0, field.right - scale.today)}
          height="555"
          fill="var(--well)"
          opacity="0.5"
        />
        {measuredVisits(data.visits, scale).map(({ key, px, py }) => (
          <path key={key} d={`M${px} ${py + 6}V571`} stroke="var(--act)" opacity="0.35" />
        ))}
        <TideArm data={data} scale={scale} ids={ids} />
        <TideSymptoms symptoms={data.symptoms} scale={scale} />
        <TideLoad data={data} scale={scale} ids={ids} />
        <TideFoot data={data} scale={scale} visits={foot} />
      </svg>
    </ChartFigure>
  );
}

/** Months in black and white; what is to come is pale. */
function TimeAxis({ data, scale }: { data: TideData; scale: TideScale }) {
  const starts = monthStarts(data.from, data.to).map((day) => ({ day, x: Math.min(field.right, Math.max(field.left, scale.x(day))) }));
  const spans = starts.slice(0, -1).map(({ day, x }, index) => ({ day, x, to: starts[index + 1]?.x ?? field.right }));
  const every = spans.length > 14 ? 3 : 1;
  return (
    <g>
      {spans.map(({ day, x, to }, index) =>
        index % every === 0 && to - x > 20 ? (
          <text
            key={day}
            x={every === 1 ? (x + to) / 2 : x}
            y="16"
            textAnchor={every === 1 ? 'middle' : 'start'}
            className={x > scale.today ? 'axis-word axis-to-come' : 'axis-word axis-gone'}
          >
            {monthName(day)}
            {index === 0 || day.slice(5, 7) === '01' ? ` ${day.slice(0, 4)}` : ''}
          </text>
        ) : null,
      )}
      <ScaleBar
        x={field.left}
        y={23}
        edges={[...spans.map(({ x }) => x - field.left), field.right - field.left]}
        now={scale.today - field.left}
      />
    </g>
  );
}

function TideTables({ data }: { data: TideData }) {
  return (
    <div className="grid gap-6">
      <PlainTable
        caption="Visits"
        captionShown
        tight
        rows={data.visits}
        getRowId={(visit) => visit.key}
        columns={[
          { id: 'visit', header: 'Visit', cell: (visit) => visit.name },
          { id: 'date', header: 'Date', cell: (visit) => visit.dateWords },
          {
            id: 'change',
            header: 'Change, %',
            numeric: true,
            cell: (visit) =>
              visit.changePercent === null
                ? 'not measured'
                : `${formatSigned(visit.changePercent)}${visit.provisional ? ' provisional' : ''}`,
          },
          {
            id: 'ratio',
            header: 'Impedance ratio',
            numeric: true,
            cell: (visit) => (visit.impedanceRatio == null ? 'not measured' : formatNumber(visit.impedanceRatio, 2)),
          },
        ]}
      />
      <PlainTable
        caption="Load lifted in the week, kg (weight × lifts)"
        captionShown
        tight
        rows={data.weeks}
        getRowId={(week) => week.starts}
        columns={[
          { id: 'week', header: 'Week from', cell: (week) => week.starts },
          ...data.exercises.map((exercise, index) => ({
            id: exercise,
            header: exercise,
            numeric: true,
            cell: (week: (typeof data.weeks)[number]) => formatNumber(week.loadsKg[index] ?? 0),
          })),
        ]}
      />
      <PlainTable
        caption="Symptoms as reported"
        captionShown
        tight
        rows={data.symptoms}
        getRowId={(symptom) => `${symptom.on}${symptom.words.join()}`}
        columns={[
          { id: 'on', header: 'Day', cell: (symptom) => symptom.on },
          { id: 'words', header: 'Report', cell: (symptom) => symptom.words.join(' ') },
          { id: 'signs', header: 'Signs reported', numeric: true, cell: (symptom) => symptom.signCount },
        ]}
      />
    </div>
  );
}
