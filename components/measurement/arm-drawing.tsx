import { formatNumber } from '../ui/format';
import { fillOf, Patterns, usePatterns } from '../chart/patterns';

/** Height of one level in the grid and in the drawing: at 4 cm between levels, 10 px are 1 cm. */
export const levelPx = 40;
const leftX = 76;
const rightX = 216;
const width = 300;
/** Arms wider than this are drawn smaller, so that they do not run into each other. */
const widestPx = 138;

export interface ArmDent {
  readonly side: 'left' | 'right';
  readonly level: number;
  readonly girthMm: number;
}

export interface ArmDrawingProps {
  leftMm: readonly (number | null)[];
  rightMm: readonly (number | null)[];
  affectedSide: 'left' | 'right';
  /** Doubtful readings: the outline shows the dent with its figure. */
  dents?: readonly ArmDent[];
}

/** Both arms to true scale, beside the rows of the grid. */
export function ArmDrawing({ leftMm, rightMm, affectedSide, dents = [] }: ArmDrawingProps) {
  const ids = usePatterns();
  const levels = leftMm.length;
  const widest = Math.max(1, ...[...leftMm, ...rightMm].map((mm) => (mm ?? 0) / Math.PI));
  const scale = Math.min(1, widestPx / widest);
  return (
    <svg
      className="arm-drawing"
      width={width}
      height={levels * levelPx + 40}
      viewBox={`0 -40 ${width} ${levels * levelPx + 40}`}
      role="img"
      aria-label={scale === 1 ? 'Both arms drawn to scale from the girths' : `Both arms drawn at ${formatNumber(scale * 100)} % of true scale`}
    >
      <Patterns ids={ids} water={5} />
      {leftMm.map((_, level) => (
        <path key={level} d={`M0 ${yOf(level)}H${width}`} stroke="var(--rule)" />
      ))}
      <Arm girthsMm={leftMm} x={leftX} scale={scale} affected={affectedSide === 'left'} water={fillOf(ids.water)} thumb={1} />
      <Arm girthsMm={rightMm} x={rightX} scale={scale} affected={affectedSide === 'right'} water={fillOf(ids.water)} thumb={-1} />
      {dents.map((dent) => (
        <Dent key={`${dent.side} ${dent.level}`} dent={dent} x={dent.side === 'left' ? leftX : rightX} scale={scale} />
      ))}
    </svg>
  );
}

/** The middle of a level's row. */
export const yOf = (level: number): number => level * levelPx + levelPx / 2;

/** Runs of neighbouring levels that were read, each as half widths down the page. */
function runsOf(girthsMm: readonly (number | null)[], scale: number): { y: number; half: number }[][] {
  const runs: { y: number; half: number }[][] = [[]];
  girthsMm.forEach((mm, level) => {
    if (mm === null) runs.push([]);
    else runs.at(-1)?.push({ y: yOf(level), half: (mm / Math.PI / 2) * scale });
  });
  return runs.filter((run) => run.length > 0);
}

/** A smooth outline down one side: level to level, upright at each. */
function edge(run: readonly { y: number; half: number }[], x: number, sign: 1 | -1): string {
  return run
    .map(({ y, half }, index) => {
      const at = x + sign * half;
      const before = run[index - 1];
      if (!before) return `M${at} ${y}`;
      const middle = (before.y + y) / 2;
      return `C${x + sign * before.half} ${middle} ${at} ${middle} ${at} ${y}`;
    })
    .join('');
}

interface ArmProps {
  girthsMm: readonly (number | null)[];
  x: number;
  scale: number;
  affected: boolean;
  water: string;
  thumb: 1 | -1;
}

function Arm({ girthsMm, x, scale, affected, water, thumb }: ArmProps) {
  const runs = runsOf(girthsMm, scale);
  const ink = affected ? 'var(--act)' : 'var(--ink)';
  const wrist = girthsMm[0] == null ? null : (girthsMm[0] / Math.PI / 2) * scale;
  return (
    <g fill="none">
      {runs.map((run) => {
        const left = edge(run, x, -1);
        const closed = `${left}L${edge(run.toReversed(), x, 1).slice(1)}Z`;
        return (
          <g key={run[0]?.y}>
            <path d={closed} fill="var(--raised)" />
            {affected ? <path d={closed} fill={water} /> : null}
            <path d={`${left}${edge(run, x, 1)}`} stroke={ink} strokeWidth={affected ? 2.25 : 1.75} />
            {run.length === 1 && run[0] ? <path d={`M${x - run[0].half} ${run[0].y}h${run[0].half * 2}`} stroke={ink} strokeWidth="1.5" /> : null}
          </g>
        );
      })}
      {wrist === null ? null : <Hand x={x} wrist={wrist} ink={ink} thumb={thumb} />}
    </g>
  );
}

/** The hand runs off the head of the drawing; the thumb says which arm it is. */
function Hand({ x, wrist, ink, thumb }: { x: number; wrist: number; ink: string; thumb: 1 | -1 }) {
  const at = (dx: number) => x + thumb * dx;
  return (
    <path
      stroke={ink}
      strokeWidth="1.3"
      d={`M${at(-wrist)} 20C${at(-wrist - 1)} 10 ${at(-wrist - 7)} -2 ${at(-wrist - 8)} -26M${at(wrist)} 20C${at(wrist + 1)} 10 ${at(wrist + 9)} 4 ${at(wrist + 15)} -6C${at(wrist + 20)} -14 ${at(wrist + 24)} -20 ${at(wrist + 28)} -26M${at(wrist + 16)} -26C${at(wrist + 12)} -20 ${at(wrist + 9)} -16 ${at(wrist + 6)} -16C${at(wrist + 4)} -17 ${at(wrist + 5)} -22 ${at(wrist + 5)} -26`}
    />
  );
}

function Dent({ dent: { level, girthMm }, x, scale }: { dent: ArmDent; x: number; scale: number }) {
  const y = yOf(level);
  const half = (girthMm / Math.PI / 2) * scale;
  return (
    <g>
      <g stroke="var(--needs)" strokeWidth="2" fill="none">
        <path d={`M${x - half - 6} ${y - 15}Q${x - half + 6} ${y} ${x - half - 6} ${y + 15}M${x + half + 6} ${y - 15}Q${x + half - 6} ${y} ${x + half + 6} ${y + 15}`} />
        <path d={`M${x - half} ${y}H${x + half}`} strokeWidth="1.25" strokeDasharray="3 3" />
      </g>
      <rect x={x - 19} y={y - 10} width="38" height="20" fill="var(--raised)" />
      <text x={x} y={y + 5} textAnchor="middle" className="arm-figure arm-figure-needs">
        {formatNumber(girthMm / 10, 1)}
      </text>
    </g>
  );
}
