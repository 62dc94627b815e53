export interface ScaleBarProps {
  x: number;
  y: number;
  /** Positions along the bar in pixels from `x`, ascending: the start of each segment, then the end. */
  edges: readonly number[];
  /** Pixels from `x` at which the future begins; segments after it are pale. */
  now?: number;
  thickness?: number;
}

/** A horizontal staff inside an SVG: the only time axis we draw. Black and white in turn, pale once in the future. */
export function ScaleBar({ x, y, edges, now, thickness = 6 }: ScaleBarProps) {
  const end = edges.at(-1) ?? 0;
  const dark = edges.slice(0, -1).flatMap((from, index) => {
    if (index % 2 === 1) return [];
    const to = edges[index + 1] ?? end;
    if (now === undefined || to <= now) return [{ from, to, gone: true }];
    if (from >= now) return [{ from, to, gone: false }];
    return [
      { from, to: now, gone: true },
      { from: now, to, gone: false },
    ];
  });
  const foot = y + thickness;
  return (
    <g>
      {dark.map(({ from, to, gone }) => (
        <rect key={from} x={x + from} y={y} width={to - from} height={thickness} fill={gone ? 'var(--ink)' : 'var(--rule-2)'} />
      ))}
      <path d={`M${x} ${y}H${x + end}M${x} ${foot}H${x + end}M${x} ${y}V${foot}M${x + end} ${y}V${foot}`} stroke="var(--ink)" fill="none" />
    </g>
  );
}

export interface StaffTick {
  /** Pixel position down the page. */
  y: number;
  /** Words at the tick; none for an unlabelled edge. */
  label?: string;
}

export interface StaffProps {
  /** Right edge of the staff; labels stand to its left. */
  x: number;
  /** Edges of the segments in pixels, in any order. */
  edges: readonly number[];
  ticks: readonly StaffTick[];
  thickness?: number;
}

/** A vertical staff inside an SVG: the only value axis we draw. The foot segment is dark. */
export function Staff({ x, edges, ticks, thickness = 7 }: StaffProps) {
  const sorted = [...edges].sort((a, b) => b - a);
  const foot = sorted[0] ?? 0;
  const head = sorted.at(-1) ?? 0;
  return (
    <g>
      <rect x={x - thickness} y={head} width={thickness} height={foot - head} fill="var(--ground)" stroke="var(--ink)" />
      {sorted
        .slice(0, -1)
        .map((low, index) =>
          index % 2 === 0 ? (
            <rect
              key={low}
              x={x - thickness}
              y={sorted[index + 1]}
              width={thickness}
              height={low - (sorted[index + 1] ?? low)}
              fill="var(--ink)"
            />
          ) : null,
        )}
      {ticks.map(({ y, label }) =>
        label === undefined ? null : (
          <text key={y} x={x - thickness - 8} y={y + 4.5} textAnchor="end" className="axis-figure">
            {label}
          </text>
        ),
      )}
    </g>
  );
}

export interface NowNotchProps {
  x: number;
  /** Tip of the notch. */
  y: number;
  /** The hairline runs down to here; none when not said. */
  to?: number;
}

/** Today: a needs hairline with a notch. */
export function NowNotch({ x, y, to }: NowNotchProps) {
  return (
    <g>
      {to === undefined ? null : <path d={`M${x} ${y - 8}V${to}`} stroke="var(--needs)" strokeWidth="1.25" />}
      <path d={`M${x - 5.5} ${y - 10}h11l-5.5 10z`} fill="var(--needs)" stroke="var(--ground)" strokeWidth="1.2" />
    </g>
  );
}
