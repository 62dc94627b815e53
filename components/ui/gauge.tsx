import { Verb } from './verbs';

/** What the level says; the word beside it always says the same. */
export type GaugeState = 'empty' | 'part' | 'waiting' | 'needs' | 'done' | 'closed';

export interface GaugeProps {
  state: GaugeState;
  /** The state in words: '3 of 6 forms', 'Yours to answer', 'Verified'. Also the name for a reader. */
  word: string;
  /** Level from 0 to 1 for part, waiting and needs; half when not said. Done and closed are full. */
  level?: number;
  size?: 56 | 84 | 96 | 120;
  /** The word under the level instead of beside it. */
  stacked?: boolean;
  /** Level alone; the word is then only read aloud, so it must stand elsewhere in sight. */
  bare?: boolean;
  /** Lets the level rise once, on save. */
  rises?: boolean;
}

const wordClass: Record<GaugeState, string> = { empty: '', part: '', waiting: '', needs: 'is-needs', done: 'is-fine', closed: '' };

/** State is a word and a small water level; never a dot, a pill or a traffic light. */
export function Gauge({ state, word, level, size = 56, stacked, bare, rises }: GaugeProps) {
  const picture = <Level state={state} level={level ?? 0.5} width={size} />;
  if (bare) {
    return (
      <span role="img" aria-label={word} className={`gauge ${rises ? 'gauge-rises' : ''}`}>
        {picture}
      </span>
    );
  }
  return (
    <span className={`gauge ${rises ? 'gauge-rises' : ''} ${stacked ? 'flex-col !items-start !gap-px' : ''}`}>
      {picture}
      <span className={`inline-flex items-center gap-1.5 ${wordClass[state]}`}>
        {state === 'closed' ? <Verb name="closed" size={15} /> : null}
        {word}
      </span>
    </span>
  );
}

function Level({ state, level, width }: { state: GaugeState; level: number; width: number }) {
  const inner = width - 2;
  const ticks = [0, 0.25, 0.5, 0.75, 1].map((share) => ({ x: 1 + inner * share, y: share === 0 || share === 1 ? 6 : 8 }));
  return (
    <svg width={width} height={14} viewBox={`0 0 ${width} 14`} aria-hidden="true">
      {ticks.map(({ x, y }) => (
        <path key={x} d={`M${x} ${y}V11`} stroke="var(--edge)" />
      ))}
      <path d={`M0.5 11.5H${width - 0.5}`} stroke="var(--edge)" />
      <Water state={state} amount={Math.min(1, Math.max(0, level)) * inner} inner={inner} />
    </svg>
  );
}

function Water({ state, amount, inner }: { state: GaugeState; amount: number; inner: number }) {
  if (state === 'empty') return null;
  if (state === 'done' || state === 'closed') {
    return (
      <>
        <rect x="1" y="4" width={inner} height="7" fill="var(--fine)" />
        <path d={`M1 1.5H${inner + 1}`} stroke="var(--fine)" strokeWidth="1.5" />
      </>
    );
  }
  const ink = state === 'needs' ? 'var(--needs)' : 'var(--act)';
  const meniscus = <path d={`M${1 + amount} 1V12.5`} stroke={ink} strokeWidth="2" />;
  if (state !== 'waiting') {
    return (
      <>
        <rect x="1" y="4" width={amount} height="7" fill={ink} />
        {meniscus}
      </>
    );
  }
  const strokes = Array.from({ length: Math.max(0, Math.floor((amount - 2) / 4)) }, (_, index) => `M${3 + index * 4} 11l4-6.5`).join('');
  return (
    <>
      <rect x="1" y="4.5" width={amount} height="6.5" stroke={ink} strokeWidth="1.2" fill="none" />
      <path d={strokes} stroke={ink} strokeWidth="0.9" />
      {meniscus}
    </>
  );
}
