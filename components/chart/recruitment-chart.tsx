import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { formatCount } from '../ui/format';
import { NowNotch, ScaleBar } from '../ui/staff';
import { dayNumber, monthName } from './days';

export interface RecruitmentChartProps {
  from: string;
  to: string;
  today: string;
  target: number;
  /** Enrolled by the end of each day given, ascending. */
  enrolled: readonly { on: string; count: number }[];
  /** The pace to come, people a day; drawn dotted. */
  pacePerDay?: number;
  label: string;
}

/** Recruitment against the plan: the plan thin, the count in act, high water the target. For the margin, 260 px wide. */
export function RecruitmentChart({ from, to, today, target, enrolled, pacePerDay, label }: RecruitmentChartProps) {
  const start = dayNumber(from);
  const x = scaleLinear([start, Math.max(start + 1, dayNumber(to))], [0, 226]);
  const at = (day: string) => x(dayNumber(day));
  const most = Math.max(target, ...enrolled.map(({ count }) => count));
  const y = scaleLinear([0, Math.max(1, most)], [102, 8]);
  const now = enrolled.at(-1)?.count ?? 0;
  const path = line<(typeof enrolled)[number]>(
    (one) => at(one.on),
    (one) => y(one.count),
  )([...enrolled]);
  const ahead = pacePerDay === undefined ? null : Math.min(most, now + pacePerDay * (dayNumber(to) - dayNumber(today)));
  const thirds = Array.from({ length: 11 }, (_, index) => index * 22.6);
  return (
    <svg width="260" height="124" viewBox="0 0 260 124" className="max-w-full" role="img" aria-label={label}>
      <path d={`M0 ${y(target)}H226`} stroke="var(--note)" strokeWidth="1.25" strokeDasharray="7 3" />
      <text x="230" y={y(target) + 4.5} className="axis-figure recruitment-target">
        {formatCount(target)}
      </text>
      <path d={`M0 102L226 ${y(target)}`} stroke="var(--edge)" />
      <path d={path ?? ''} fill="none" stroke="var(--act)" strokeWidth="2.25" />
      {ahead === null ? null : (
        <path d={`M${at(today)} ${y(now)}L226 ${y(ahead)}`} stroke="var(--act)" strokeWidth="1.5" strokeDasharray="2 3" />
      )}
      <path d={`M${at(today)} ${y(now) - 9}v18`} stroke="var(--act)" strokeWidth="2.25" />
      <text
        x={at(today) + (at(today) > 190 ? -6 : 7)}
        y={Math.min(98, y(now) + 18)}
        textAnchor={at(today) > 190 ? 'end' : 'start'}
        className="chart-name halo"
      >
        {formatCount(now)} today
      </text>
      <ScaleBar x={0} y={102} edges={thirds} now={at(today)} thickness={5} />
      <NowNotch x={at(today)} y={104} />
      <text x="0" y="123" className="axis-word">
        {monthName(from)} {from.slice(0, 4)}
      </text>
      <text x="226" y="123" textAnchor="end" className="axis-word">
        {monthName(to)} {to.slice(0, 4)}
      </text>
    </svg>
  );
}
