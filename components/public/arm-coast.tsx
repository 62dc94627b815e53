/** The arm as a coast: its outline, five fingers as strokes, waterlines round both. Drawn by us; girths in cm are invented. */
const outline = [
  'M851.2 -138.0C828.5 -131.1 754.8 -106.0 714.4 -96.2C674.0 -86.4 635.8 -82.3 608.0 -78.9C580.2 -75.5 567.4 -77.0 547.2 -75.7C527.0 -74.4 506.6 -72.7',
  '486.4 -71.1C466.2 -69.5 445.8 -67.4 425.6 -66.0C405.4 -64.6 385.0 -63.1 364.8 -62.7C344.6 -62.3 324.2 -63.7 304.0 -63.6C283.8 -63.5 263.4 -63.0 243.2',
  '-61.9C223.0 -60.9 202.6 -59.3 182.4 -57.3C162.2 -55.4 141.8 -52.5 121.6 -50.1C101.4 -47.7 81.0 -44.7 60.8 -42.8C40.6 -40.9 17.3 -38.4 0.0 -38.7C-17.3',
  '-39.0 -28.3 -41.9 -43.4 -44.5C-58.6 -47.1 -78.2 -52.3 -91.2 -54.3C-104.2 -56.3 -112.9 -58.3 -121.6 -56.5C-130.3 -54.7 -137.9 -49.6 -143.3 -43.4C-148.7',
  '-37.3 -151.6 -28.2 -154.2 -19.5C-156.7 -10.9 -158.9 -0.3 -158.5 8.7C-158.2 17.7 -156.7 27.9 -152.0 34.7C-147.3 41.6 -140.4 46.7 -130.3 49.9C-120.2',
  '53.2 -105.6 54.6 -91.2 54.3C-76.8 53.9 -58.6 50.4 -43.4 47.8C-28.3 45.2 -17.3 39.5 0.0 38.7C17.3 37.9 40.6 40.9 60.8 42.8C81.0 44.7 101.4 47.7 121.6',
  '50.1C141.8 52.5 162.2 55.4 182.4 57.3C202.6 59.3 223.0 60.9 243.2 61.9C263.4 63.0 283.8 63.5 304.0 63.6C324.2 63.7 344.6 62.3 364.8 62.7C385.0 63.1',
  '405.4 64.6 425.6 66.0C445.8 67.4 466.2 69.5 486.4 71.1C506.6 72.7 527.0 74.4 547.2 75.7C567.4 77.0 580.2 75.5 608.0 78.9C635.8 82.3 674.0 83.8 714.4',
  '96.2C754.8 108.7 828.5 144.2 851.2 153.8L1976 461.4L1976 -414Z',
].join(' ');
const fingers = [
  ['M-108.6 -43.4Q-173.7 -60.8 -232.3 -82.5', 27.14],
  ['M-128.1 -19.5Q-201.9 -31.5 -277.9 -42.3', 32.03],
  ['M-134.6 8.7Q-212.8 4.3 -299.7 0.0', 34.2],
  ['M-121.6 36.9Q-195.4 40.2 -275.8 43.4', 32.57],
  ['M-13.0 28.2C-71.7 67.3 -121.6 91.2 -171.5 99.9', 33.66],
] as const;

/** Widths of the waterlines round the coast, outermost first: each stroke is covered by a narrower one in the colour of the ground. */
const waterlines = [
  1392, 1320.7, 1251.3, 1183.7, 1117.9, 1054, 991.9, 931.7, 873.3, 816.7, 762, 709.1, 658.1, 608.9, 561.5, 516, 472.3, 430.5, 390.5, 352.3, 316, 281.5, 248.9,
  218.1, 189.1, 162, 136.7, 113.3, 91.7, 71.9, 54, 37.9, 23.7, 11.3,
];
const lineWidth = 2.6;
const shoreWidth = 3.4;

/** Girths every 4 cm from the wrist, with half the arm's width there in the drawing. */
const soundings = [
  [16.0, 37.7], [17.7, 41.8], [20.7, 49.1], [23.7, 56.3], [25.6, 60.9], [26.3, 62.6], [25.9, 61.7], [27.3, 65], [29.4, 70.1], [31.3, 74.7], [32.6, 77.9],
] as const;
const stepX = 60.8;

export interface ArmCoastProps {
  /** Size of the drawing's own field. */
  width: number;
  height: number;
  /** Where the wrist stands in it, and how the arm leans, in degrees. */
  at: readonly [number, number];
  leanDegrees: number;
  /** The waterlines fade out to the left, where words stand. */
  fades?: boolean;
}

/** One outline at one width: the hand and its fingers together. */
function Coast({ width, colour }: { width: number; colour: string }) {
  return (
    <g stroke={colour} fill={colour} strokeLinejoin="round" strokeLinecap="round">
      <use href="#coast-arm" strokeWidth={width} />
      {fingers.map(([, girth], index) => (
        <use key={girth} href={`#coast-finger-${index}`} strokeWidth={width + girth} fill="none" />
      ))}
    </g>
  );
}

/** Decoration of the public pages only. */
export function ArmCoast({ width, height, at: [x, y], leanDegrees, fades }: ArmCoastProps) {
  return (
    <svg className="arm-coast" viewBox={`0 0 ${width} ${height}`} preserveAspectRatio="xMaxYMid slice" aria-hidden="true">
      <defs>
        <path id="coast-arm" d={outline} />
        {fingers.map(([path], index) => (
          <path key={path} id={`coast-finger-${index}`} d={path} />
        ))}
        <linearGradient id="coast-fade" x1="0" x2="1">
          <stop offset="0.35" stopColor="#000" />
          <stop offset="0.47" stopColor="#fff" />
        </linearGradient>
        <mask id="coast-mask">
          <rect width={width} height={height} fill="url(#coast-fade)" />
        </mask>
      </defs>
      <g mask={fades ? 'url(#coast-mask)' : undefined}>
        <g transform={`translate(${x} ${y}) rotate(${leanDegrees})`}>
          {waterlines.map((line, index) => (
            <g key={line}>
              <Coast width={line} colour={`color-mix(in srgb, var(--act) ${Math.round(14 + (68 * index) / waterlines.length)}%, var(--ground))`} />
              <Coast width={line - lineWidth} colour="var(--ground)" />
            </g>
          ))}
          <Coast width={shoreWidth} colour="var(--ink)" />
          <Coast width={0} colour="var(--coast)" />
          {soundings.map(([girthCm, half], index) => (
            <g key={girthCm}>
              <path d={`M${index * stepX} ${-half}V${half}`} stroke="var(--ink)" strokeDasharray="1 3" />
              <text x={index * stepX + 6} y={index % 2 === 0 ? 17 : -7} className="coast-figure">
                {girthCm.toFixed(1)}
              </text>
            </g>
          ))}
        </g>
      </g>
    </svg>
  );
}
