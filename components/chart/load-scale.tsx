import { formatNumber } from '../ui/format';
import { ScaleBar } from '../ui/staff';
import { fillOf, Patterns, usePatterns } from './patterns';

export interface LoadScaleProps {
  /** Yours, as set on the stepper, kg. */
  yoursKg: number;
  /** Last week's heaviest; null at the first session. */
  lastWeekKg: number | null;
  /** Most that the rule allows this week, kg. */
  upToKg: number;
  /** From here on the rule asks to contact the site first, kg. */
  outsideKg: number;
}

/** The phone's load scale: last week, the allowed zone, yours; hatched where it lies outside the rule. */
export function LoadScale({ yoursKg, lastWeekKg, upToKg, outsideKg }: LoadScaleProps) {
  const ids = usePatterns();
  const end = Math.max(14, Math.ceil((Math.max(yoursKg, outsideKg) + 3) / 2) * 2);
  const x = (kg: number) => 4 + (Math.min(kg, end) * 342) / end;
  const edges = Array.from({ length: end + 1 }, (_, kg) => x(kg) - 4);
  const from = lastWeekKg ?? 0;
  const past = yoursKg > upToKg;
  return (
    <svg width="100%" viewBox="0 0 350 86" role="img" aria-label={spoken({ yoursKg, lastWeekKg, upToKg, outsideKg })}>
      <Patterns ids={ids} />
      <rect x={x(from)} y="28" width={Math.max(0, x(upToKg) - x(from))} height="26" fill="var(--select)" />
      <rect x={x(outsideKg)} y="28" width={Math.max(0, x(end) - x(outsideKg))} height="26" fill={fillOf(ids.outside)} />
      <ScaleBar x={4} y={37} edges={edges} thickness={8} />
      <path d={`M${x(from)} 28V54M${x(upToKg)} 28V54`} stroke="var(--ink)" strokeWidth="1.5" />
      {lastWeekKg === null ? null : (
        <text x={Math.max(x(from) - 6, 84)} y="74" textAnchor="end" className="load-words">
          last week {formatNumber(lastWeekKg, Number.isInteger(lastWeekKg) ? 0 : 1)}
        </text>
      )}
      <text x={Math.max(x(upToKg) + 5 - (upToKg > end * 0.66 ? 130 : 0), 90)} y="74" className="load-words load-words-ink">
        up to {formatNumber(upToKg, Number.isInteger(upToKg) ? 0 : 1)} this week
      </text>
      <path d={`M${x(yoursKg) - 10} 12h20l-10 22z`} fill={past ? 'var(--needs)' : 'var(--act)'} stroke="var(--ground)" strokeWidth="2" />
    </svg>
  );
}

function spoken({ yoursKg, lastWeekKg, upToKg }: LoadScaleProps): string {
  const last = lastWeekKg === null ? 'no load last week' : `last week ${lastWeekKg} kg`;
  const side = yoursKg > upToKg ? 'more than the rule allows' : 'within the rule';
  return `Yours ${yoursKg} kg, ${last}, up to ${upToKg} kg this week: ${side}.`;
}
