import { formatNumber, formatSigned } from '../ui/format';
import { Staff } from '../ui/staff';

export interface ChangeStroke {
  readonly label: string;
  /** Percent. */
  readonly changePct: number;
}

export interface ChangeStaffProps {
  /** This sitting, percent. */
  nowPct: number;
  earlier: readonly ChangeStroke[];
  /** Percent at which the primary definition counts swelling; null where it is not one of change. */
  highWaterPct: number;
  /** 95 % measurement error of a change, percentage points. */
  errorPoints: number;
}

const width = 395;
const head = 18;
const foot = 282;

/** Edges of a staff that holds every value: whole steps of 2, 4 or 10 percent. */
function edgesFor(values: readonly number[]): number[] {
  const low = Math.min(-4, ...values);
  const high = Math.max(12, ...values);
  const step = high - low > 60 ? 10 : high - low > 26 ? 4 : 2;
  const from = Math.floor(low / step) * step;
  const count = Math.ceil((high - from) / step);
  return Array.from({ length: count + 1 }, (_, index) => from + index * step);
}

/** Labels keep 17 px between them, from the foot up. */
function spread(marks: readonly { y: number; label: string }[]): { y: number; at: number; label: string }[] {
  let last = Infinity;
  return marks
    .toSorted((a, b) => b.y - a.y)
    .map(({ y, label }) => {
      last = Math.min(y, last - 17);
      return { y, at: last, label };
    });
}

/** The change from baseline on its staff: now, earlier sittings, the measurement error and high water. */
export function ChangeStaff({ nowPct, earlier, highWaterPct, errorPoints }: ChangeStaffProps) {
  const values = [nowPct, errorPoints, -errorPoints, ...earlier.map(({ changePct }) => changePct), highWaterPct + 1];
  const edges = edgesFor(values);
  const [low, high] = [edges[0] ?? -4, edges.at(-1) ?? 12];
  const y = (pct: number) => foot - ((pct - low) / (high - low)) * (foot - head);
  const ticks = edges.map((pct, index) => ({ y: y(pct), ...(index % 2 === 0 ? { label: formatSigned(pct, 0) } : {}) }));
  const strokes = spread(earlier.map(({ label, changePct }) => ({ y: y(changePct), label: `${label} ${formatSigned(changePct)}` })));
  const finding = `Change from baseline ${formatSigned(nowPct)} percent; measurement error plus or minus ${formatNumber(errorPoints, 1)} points.`;
  return (
    <svg className="change-staff" viewBox={`0 0 ${width} 300`} role="img" aria-label={finding}>
      <rect x="46" y={y(errorPoints)} width={width - 46} height={y(-errorPoints) - y(errorPoints)} fill="var(--select)" opacity="0.75" />
      <Staff x={42} edges={edges.map(y)} ticks={ticks} thickness={8} />
      <text x={width} y={y(-errorPoints) - 9} textAnchor="end" className="staff-words">
        measurement error ±{formatNumber(errorPoints, 1)}
      </text>
      <path d={`M46 ${y(highWaterPct)}H${width}`} stroke="var(--note)" strokeWidth="1.5" strokeDasharray="11 4" />
      <text x={width} y={y(highWaterPct) - 7} textAnchor="end" className="staff-words staff-note">
        high water
      </text>
      {strokes.map(({ y: from, at, label }) => (
        <g key={label}>
          <path d={`M46 ${from}h10L62 ${at}`} stroke="var(--ink)" strokeWidth="1.5" fill="none" />
          <text x="68" y={at + 4.5} className="staff-words">
            {label}
          </text>
        </g>
      ))}
      <path d={`M46 ${y(nowPct)}H236`} stroke="var(--act)" strokeWidth="3" />
      <rect x="230" y={y(nowPct) - 6} width="12" height="12" transform={`rotate(45 236 ${y(nowPct)})`} fill="var(--act)" />
      <text x="252" y={y(nowPct) + 5} className="staff-now">
        now {formatSigned(nowPct)}
      </text>
    </svg>
  );
}
