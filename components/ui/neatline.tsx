export interface NeatlineProps {
  /** Segments in the line: the study's 48 months, or the participant's own 24. */
  segments: number;
  /** How much of the time is gone, 0 to 1. */
  gone: number;
}

/**
 * The line under every page head: the study's own time. It is decoration to a
 * reader; the footer says the month in words.
 */
export function Neatline({ segments, gone }: NeatlineProps) {
  const now = Math.min(1, Math.max(0, gone)) * segments;
  const darks = Array.from({ length: Math.ceil(segments / 2) }, (_, index) => index * 2);
  return (
    <div className="neatline" aria-hidden="true">
      <svg width="100%" height="11" viewBox={`0 0 ${segments} 11`} preserveAspectRatio="none">
        <path d={`M0 0.5H${segments}M0 9.5H${segments}`} stroke="var(--ink)" vectorEffect="non-scaling-stroke" />
        {darks.map((from) => {
          const past = Math.min(1, Math.max(0, now - from));
          return (
            <g key={from}>
              {past > 0 ? <rect x={from} y="2" width={past} height="6" fill="var(--ink)" /> : null}
              {past < 1 ? <rect x={from + past} y="2" width={1 - past} height="6" fill="var(--rule-2)" /> : null}
            </g>
          );
        })}
      </svg>
      <svg className="neatline-notch" style={{ left: `clamp(6px, ${(100 * now) / segments}%, calc(100% - 6px))` }} width="12" height="12" viewBox="0 0 12 12">
        <path d="M0.5 0h11l-5.5 11z" fill="var(--needs)" stroke="var(--ground)" strokeWidth="1.5" />
      </svg>
    </div>
  );
}
