import { line } from 'd3-shape';
import { formatCount, formatNumber, formatPercent } from '../ui/format';
import { fillOf, Patterns, usePatterns } from './patterns';

export interface SparklineProps {
  /** In time; null is a gap. */
  values: readonly (number | null)[];
  /** What it shows and where it ends, in one sentence. */
  label: string;
  width?: number;
  height?: number;
}

/** A level over time in the height of a line of text, on its own baseline. */
export function Sparkline({ values, label, width = 96, height = 22 }: SparklineProps) {
  const known = values.filter((value): value is number => value !== null);
  const [low, high] = [Math.min(0, ...known), Math.max(0.0001, ...known)];
  const x = (index: number) => 2 + (index * (width - 6)) / Math.max(1, values.length - 1);
  const y = (value: number) => height - 3 - ((value - low) * (height - 7)) / (high - low);
  const path = line<number | null>(
    (_, index) => x(index),
    (value) => y(value ?? 0),
  ).defined((value) => value !== null)([...values]);
  const end = values.findLastIndex((value) => value !== null);
  return (
    <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={label}>
      <path d={`M0 ${y(0)}H${width}`} stroke="var(--edge)" />
      <path d={path ?? ''} fill="none" stroke="var(--act)" strokeWidth="1.75" />
      {end < 0 ? null : <path d={`M${x(end)} ${y(values[end] ?? 0) - 4}v8`} stroke="var(--act)" strokeWidth="2" />}
    </svg>
  );
}

export interface ShareBarProps {
  /** 'Held, or up by 2 kg or less'. */
  words: string;
  count: number;
  of: number;
  /** Outside the rule: the bar turns to needs. */
  outside?: boolean;
}

/** A share on its own short staff, with percent and count: how the rule was kept. */
export function ShareBar({ words, count, of, outside }: ShareBarProps) {
  const share = of > 0 ? count / of : 0;
  return (
    <div className="share-bar">
      <p>{words}</p>
      <svg width="128" height="14" viewBox="0 0 128 14" aria-hidden="true">
        <rect x="1" y="3" width={126 * share} height="8" fill={outside ? 'var(--needs)' : 'var(--act)'} />
        <path d="M0.5 0V11.5H127.5V0" fill="none" stroke="var(--edge)" />
      </svg>
      <b className="t-num">{of > 0 ? formatPercent(share) : 'none yet'}</b>
      <span className="t-num text-ink-2">
        {formatCount(count)} of {formatCount(of)}
      </span>
    </div>
  );
}

export interface AgeSpanProps {
  days: number;
  limitDays: number;
  /** Longest age the column can show; longer ones end there and keep their figure. */
  mostDays?: number;
  /** What is counted, for a reader: 'since asked'. */
  words?: string;
}

/** Days since something was asked, against its limit: thick is time gone, dots are past the limit. */
export function AgeSpan({ days, limitDays, mostDays = 30, words = 'since asked' }: AgeSpanProps) {
  const x = (value: number) => (Math.min(value, mostDays) * 168) / mostDays;
  const late = days > limitDays;
  const end = x(days);
  return (
    <svg className="h-auto max-w-full" width="202" height="20" viewBox="0 0 202 20" role="img" aria-label={`${days} days ${words}${late ? `, limit ${limitDays}` : ''}`}>
      <path d={`M0 10H${Math.min(end, x(limitDays))}`} stroke="var(--act)" strokeWidth="4" />
      {late ? (
        <path d={`M${x(limitDays)} 10H${end}`} stroke="var(--needs)" strokeWidth="1.75" strokeDasharray="2 3" />
      ) : (
        <path d={`M${x(limitDays)} 8v4`} stroke="var(--note)" />
      )}
      <path d={`M0 4V16M${end} 4V16`} stroke="var(--ink)" strokeWidth="1.25" />
      <text x={end + 8} y="15" className={`chart-figure ${late ? 'age-late' : ''}`}>
        {formatNumber(days)}
      </text>
    </svg>
  );
}

export interface SealDay {
  day: string;
  entries: number;
}

export interface SealedDaysProps {
  days: readonly SealDay[];
  /** First day that does not match; everything from there on is unproven. */
  cutAt?: string;
  /** The last day is still open: drawn hollow. */
  openDay?: string;
  /** Words under single days: '4 Jan 2027', 'today, open'. */
  marks?: readonly { day: string; words: string }[];
  label: string;
}

/** Entries a day over the sealed line; the line is cut where a seal does not match. */
export function SealedDays({ days, cutAt, openDay, marks = [], label }: SealedDaysProps) {
  const ids = usePatterns();
  const most = Math.max(1, ...days.map(({ entries }) => entries));
  const step = 1000 / Math.max(1, days.length);
  const cut = cutAt === undefined ? days.length : days.findIndex(({ day }) => day >= cutAt);
  const sound = (cut < 0 ? days.length : cut) * step;
  return (
    <svg width="100%" viewBox={`0 0 1000 ${marks.length > 0 ? 112 : 90}`} role="img" aria-label={label}>
      <Patterns ids={ids} />
      {days.map(({ day, entries }, index) => {
        const height = (66 * entries) / most;
        const frame = { x: index * step + step * 0.12, y: 68 - height, width: step * 0.7, height };
        if (day === openDay) return <rect key={day} {...frame} fill="none" stroke="var(--act)" strokeWidth="1.25" />;
        return <rect key={day} {...frame} fill={index * step >= sound ? fillOf(ids.outside) : 'var(--act)'} />;
      })}
      <path d={`M0 80H${sound}`} stroke="var(--fine)" strokeWidth="4" />
      {days.map(({ day }, index) =>
        index > 0 && index * step < sound ? (
          <g key={day}>
            <path d={`M${index * step} 74v12`} stroke="var(--ground)" strokeWidth="4" />
            <path d={`M${index * step} 74v12`} stroke="var(--fine)" strokeWidth="1.5" />
          </g>
        ) : null,
      )}
      {marks.map(({ day, words }) => {
        const x = (days.findIndex((one) => one.day === day) + 0.5) * step;
        return (
          <text key={day} x={x} y="106" textAnchor={x > 950 ? 'end' : x < 50 ? 'start' : 'middle'} className="axis-word">
            {words}
          </text>
        );
      })}
      {sound < 1000 ? (
        <>
          <path d={`M${sound + 5} 71l-5 18M${sound + 14} 71l-5 18`} stroke="var(--needs)" strokeWidth="2.25" />
          <path d={`M${sound + 17} 80H1000`} stroke="var(--edge)" strokeWidth="2" strokeDasharray="3 4" />
        </>
      ) : null}
    </svg>
  );
}
