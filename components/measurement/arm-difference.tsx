import { formatNumber, formatSigned } from '../ui/format';
import { levelPx, yOf } from './arm-drawing';

/** Width of the figure; the bars keep to `barsPx` of it, so that their figures have room beside them. */
const width = 170;
const barsPx = 110;
/** Pixels for one millimetre of difference, where it fits. */
const mostPerMm = 6.2;

type Levels = readonly (number | null)[];

export interface ArmDifferenceProps {
  map: { readonly startOffsetMm: number; readonly stepMm: number };
  /** Left minus right now and at baseline, in mm. */
  nowMm: Levels;
  baselineMm: Levels | null;
}

/** Left minus right at each level, its baseline an upright stroke: the rows run on from the arms, and name their level where the arms stand above. */
export function ArmDifference({ map, nowMm, baselineMm }: ArmDifferenceProps) {
  const known = [...nowMm, ...(baselineMm ?? [])].filter((mm) => mm !== null);
  const [low, high] = [Math.min(0, ...known), Math.max(0, ...known)];
  const perMm = Math.min(mostPerMm, barsPx / Math.max(1, high - low));
  const zeroX = 4 - low * perMm + (barsPx - (high - low) * perMm) / 2;
  const level = (index: number) => formatNumber((map.startOffsetMm + index * map.stepMm) / 10, 0);
  const spoken = nowMm.flatMap((mm, index) => (mm === null ? [] : [`at ${level(index)} cm ${formatSigned(mm / 10, 1)}`]));
  return (
    <svg className="arm-difference" width={width} height={nowMm.length * levelPx} viewBox={`0 0 ${width} ${nowMm.length * levelPx}`} role="img" aria-label={`Left minus right in centimetres: ${spoken.join(', ')}`}>
      {nowMm.map((mm, index) => (
        <g key={index}>
          <path d={`M0 ${yOf(index)}H${width}`} stroke="var(--rule)" />
          <text x="-10" y={yOf(index) + 4.5} textAnchor="end" className="arm-level">
            {level(index)}
          </text>
          {mm === null ? null : <Bar y={yOf(index)} zeroX={zeroX} endX={zeroX + mm * perMm} beforeX={baselineMm?.[index] == null ? null : zeroX + baselineMm[index] * perMm} figure={formatSigned(mm / 10, 1)} />}
        </g>
      ))}
      <path d={`M${zeroX} 2V${nowMm.length * levelPx - 4}`} stroke="var(--ink)" />
    </svg>
  );
}

/** One level: the bar from zero, the stroke of the baseline, and the figure clear of both. */
function Bar({ y, zeroX, endX, beforeX, figure }: { y: number; zeroX: number; endX: number; beforeX: number | null; figure: string }) {
  return (
    <>
      <rect x={Math.min(zeroX, endX)} y={y - 5} width={Math.abs(endX - zeroX)} height="10" fill="var(--act)" />
      {beforeX === null ? null : <path d={`M${beforeX} ${y - 9}v18`} stroke="var(--ink)" strokeWidth="1.5" />}
      <text x={Math.max(zeroX, endX, beforeX ?? zeroX) + 9} y={y + 4.5} className="arm-figure arm-figure-beside">
        {figure}
      </text>
    </>
  );
}
