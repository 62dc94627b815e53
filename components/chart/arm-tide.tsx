import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { formatNumber, formatSigned } from '../ui/format';
import { PlainTable } from '../ui/plain-table';
import { ScaleBar } from '../ui/staff';
import { ChartFigure } from './chart-figure';
import { dayNumber, monthName, monthStarts, shortDay } from './days';
import { fillOf, Patterns, usePatterns } from './patterns';

export interface ArmPoint {
  on: string;
  changePercent: number;
  provisional?: boolean;
  /** Words at the point, in plain speech: 'today', 'fuller in January'. */
  words?: string;
}

export interface ArmTideProps {
  points: readonly ArmPoint[];
  thresholdPercent: number;
  errorPercent: number;
  /** 'Today your left arm measures a little fuller than at the start.' */
  finding: string;
}

const box = { left: 10, right: 326, top: 20, foot: 272 } as const;

/** A participant's own arm in plain words: no numbers on the drawing, all of them in the table. */
export function ArmTide({ points, thresholdPercent, errorPercent, finding }: ArmTideProps) {
  const ids = usePatterns();
  const sorted = [...points].sort((a, b) => a.on.localeCompare(b.on));
  const [first, last] = [sorted[0], sorted.at(-1)];
  if (!first || !last) return null;
  const span = Math.max(60, dayNumber(last.on) - dayNumber(first.on) + 30);
  const x = (day: string) => box.left + 8 + ((dayNumber(day) - dayNumber(first.on)) * (box.right - box.left - 8)) / span;
  const values = sorted.map(({ changePercent }) => changePercent);
  const y = scaleLinear([Math.min(-errorPercent, ...values), Math.max(thresholdPercent * 1.2, ...values)], [box.foot, box.top]);
  const path = line<ArmPoint>(
    (point) => x(point.on),
    (point) => y(point.changePercent),
  )(sorted);
  return (
    <ChartFigure label="Your arm over time" finding={finding} findingHidden table={<ArmTable points={sorted} />}>
      <svg width="100%" viewBox="0 0 350 322" role="img" aria-label={finding}>
        <Patterns ids={ids} water={5} />
        <rect x="0" y={y(errorPercent)} width="350" height={y(-errorPercent) - y(errorPercent)} fill="var(--select)" />
        <path d={`M${x(first.on)} ${y(0)}L${(path ?? '').slice(1)}L${x(last.on)} ${y(0)}Z`} fill={fillOf(ids.water)} />
        <path d={`M0 ${y(thresholdPercent)}H350`} stroke="var(--note)" strokeWidth="2" strokeDasharray="12 5" />
        <text x="0" y={y(thresholdPercent) - 10} className="arm-note">
          High water: we would ask you in
        </text>
        <text x="8" y={y(-errorPercent) - 11} className="load-words load-words-ink">
          about the same as at the start
        </text>
        <path d={path ?? ''} fill="none" stroke="var(--act)" strokeWidth="3" />
        {sorted.map((point) => (
          <ArmMark key={point.on} point={point} x={x(point.on)} y={y(point.changePercent)} />
        ))}
        <Months from={first.on} to={last.on} x={x} />
      </svg>
    </ChartFigure>
  );
}

function ArmMark({ point, x, y }: { point: ArmPoint; x: number; y: number }) {
  const { provisional, words } = point;
  return (
    <g>
      <rect
        x={x - 6}
        y={y - 6}
        width="12"
        height="12"
        transform={`rotate(45 ${x} ${y})`}
        fill={provisional ? 'var(--ground)' : 'var(--act)'}
        stroke={provisional ? 'var(--act)' : 'var(--ground)'}
        strokeWidth="2.5"
      />
      {words ? (
        <text
          x={provisional ? x + 14 : x}
          y={y - 17}
          textAnchor={x > 200 && words.length > 8 ? 'end' : x < 60 ? 'start' : 'middle'}
          className="arm-words halo"
        >
          {words}
        </text>
      ) : null}
    </g>
  );
}

/** Months as the staff, a name at every third. */
function Months({ from, to, x }: { from: string; to: string; x: (day: string) => number }) {
  const starts = monthStarts(from, to).map((day) => ({ day, at: Math.max(box.left, x(day)) }));
  const every = Math.ceil((starts.length - 1) / 4);
  return (
    <g>
      <ScaleBar x={box.left} y={284} edges={starts.map(({ at }) => at - box.left)} thickness={7} />
      {starts.slice(0, -1).map(({ day, at }, index) =>
        index % every === 0 ? (
          <text key={day} x={at} y="312" className="load-words">
            {monthName(day)}
          </text>
        ) : null,
      )}
    </g>
  );
}

function ArmTable({ points }: { points: readonly ArmPoint[] }) {
  return (
    <PlainTable
      caption="Your arm against the start"
      tight
      rows={points}
      getRowId={(point) => point.on}
      columns={[
        { id: 'on', header: 'Day', cell: (point) => `${shortDay(point.on)} ${point.on.slice(0, 4)}` },
        {
          id: 'change',
          header: 'Change, %',
          numeric: true,
          cell: (point) => (point.changePercent === 0 ? formatNumber(0, 1) : formatSigned(point.changePercent)),
        },
      ]}
    />
  );
}
