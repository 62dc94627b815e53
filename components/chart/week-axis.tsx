import { ScaleBar } from '../ui/staff';
import { dayNumber, dayOf, shortDay } from './days';

/** The one axis of a work list, whole weeks from a Monday. Days are `yyyy-mm-dd`. */
export interface WeekAxis {
  from: string;
  weeks: number;
  today: string;
}

/** What one row shows on it. A span starts at `opens` and ends at `closes`; whatever passed the limit runs on in dots to today. */
export interface WeekWindow {
  opens?: string;
  target?: string;
  closes?: string;
  appointment?: string;
  /** Consent needed by. */
  neededBy?: string;
  /** Done already: nothing runs past the limit. */
  settled?: boolean;
}

const width = 312;

function scaleOf({ from, weeks, today }: WeekAxis) {
  const first = dayNumber(from);
  const x = (day: string) => ((dayNumber(day) - first) * width) / (weeks * 7);
  return { x, clipped: (day: string) => Math.min(width, Math.max(0, x(day))), now: x(today) + width / (weeks * 14) };
}

/** Head of the axis: the staff with its dates and the notch of today, or only the line. */
export function WeekAxisHead({ axis, labelled }: { axis: WeekAxis; labelled: boolean }) {
  const { now } = scaleOf(axis);
  if (!labelled) return <NowLine now={now} />;
  const week = width / axis.weeks;
  const edges = Array.from({ length: axis.weeks + 1 }, (_, index) => index * week);
  const starts = edges.slice(0, -1).filter((_, index) => index % 2 === 0);
  return (
    <svg viewBox={`0 0 ${width} 66`} width={width} height="66" aria-hidden="true">
      {starts.map((x) => (
        <text key={x} x={x} y="27" className="axis-word">
          {shortDay(dayOf(dayNumber(axis.from) + Math.round((x * axis.weeks * 7) / width)))}
        </text>
      ))}
      <ScaleBar x={0} y={36} edges={edges} now={now} />
      <path d={`M${now} 32V67`} stroke="var(--needs)" strokeWidth="1.25" />
      <path d={`M${now - 5.5} 30h11l-5.5 10z`} fill="var(--needs)" stroke="var(--ground)" strokeWidth="1.2" />
    </svg>
  );
}

/** One row's window, appointment and lateness on the shared axis. The row says the same in words. */
export function WeekMark({ axis, window }: { axis: WeekAxis; window?: WeekWindow | undefined }) {
  const scale = scaleOf(axis);
  return (
    <>
      <NowLine now={scale.now} />
      <svg viewBox={`0 0 ${width} 58`} width={width} height="58" aria-hidden="true" className="relative">
        {window ? <Span scale={scale} window={window} /> : null}
      </svg>
    </>
  );
}

function NowLine({ now }: { now: number }) {
  return <span className="work-now" style={{ left: now }} aria-hidden="true" />;
}

function Span({ scale, window }: { scale: ReturnType<typeof scaleOf>; window: WeekWindow }) {
  const { x, clipped, now } = scale;
  const { opens, target, closes, appointment, neededBy, settled } = window;
  const end = closes ?? neededBy;
  const from = opens ? clipped(opens) : 0;
  const to = end ? clipped(end) : now;
  const inView = (day: string | undefined): day is string => day !== undefined && x(day) >= 0 && x(day) <= width;
  return (
    <g stroke="var(--ink)" strokeWidth="1.25" fill="none">
      {from < now ? <path d={`M${from} 34H${Math.min(now, to)}`} stroke="var(--act)" strokeWidth="4" /> : null}
      {to > now ? <path d={`M${Math.max(now, from)} 34H${to}`} /> : null}
      {to < now && !settled ? <path d={`M${to} 34H${now}`} stroke="var(--needs)" strokeWidth="1.75" strokeDasharray="2 3" /> : null}
      {inView(opens) ? <path d={`M${x(opens)} 28V40`} /> : null}
      {inView(closes) ? <path d={`M${x(closes)} 28V40`} /> : null}
      {inView(target) ? <path d={`M${x(target)} 34V41`} /> : null}
      {inView(appointment) ? <path d={`M${x(appointment) - 5} 20h10l-5 9z`} fill="var(--ink)" stroke="none" /> : null}
      {inView(neededBy) ? (
        <>
          <path d={`M${x(neededBy)} 24V40`} />
          <path d={`M${x(neededBy)} 24h9l-2.5 3 2.5 3h-9z`} fill="var(--ink)" stroke="none" />
        </>
      ) : null}
    </g>
  );
}
