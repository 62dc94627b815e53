import type { ReactNode } from 'react';
import { Gauge } from './gauge';

/** Nothing here: what is true, when it last changed, where to go. */
export function Empty({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="py-6">
      <h3>{title}</h3>
      {children ? <p className="t-small mt-1 text-ink-2">{children}</p> : null}
      {action ? <p className="mt-2.5">{action}</p> : null}
    </div>
  );
}

export interface LoadingProps {
  /** What is being done: 'Working out the results'. */
  title: string;
  /** How far: 'snapshot S-0118, 61 of 142 people'. */
  detail?: string;
  /** 0 to 1 where known. */
  level?: number;
  /** How long: 'About 20 seconds. You can leave this page.' */
  children?: ReactNode;
}

/** Work in progress: a level with what is being done and how long. */
export function Loading({ title, detail, level, children }: LoadingProps) {
  return (
    <div role="status" className="py-6">
      <h3>{title}</h3>
      {detail ? (
        <p className="mt-2">
          <Gauge state="part" size={120} level={level ?? 0} word={detail} />
        </p>
      ) : null}
      {children ? <p className="t-small mt-2 text-ink-2">{children}</p> : null}
    </div>
  );
}

/** Where text will stand: still waterlines at its length. No shimmer. */
export function Waterlines({ widths = [220, 300, 180], label = 'Loading' }: { widths?: readonly number[]; label?: string }) {
  return (
    <div role="status" className="grid grid-cols-[minmax(0,1fr)] gap-[11px]">
      <span className="sr-only">{label}</span>
      {widths.map((width, index) => (
        <span key={index} className="waterlines" style={{ width }} />
      ))}
    </div>
  );
}

export interface BrokenProofProps {
  /** 'The line is cut at 18 Feb 2027'. */
  title: string;
  /** What is now unproven, and who was told. */
  children: ReactNode;
}

/** A proof that does not hold. */
export function BrokenProof({ title, children }: BrokenProofProps) {
  const sealed = [23, 46, 69, 92, 115];
  return (
    <div role="alert">
      <h3 className="!text-needs">{title}</h3>
      <svg width="290" height="22" viewBox="0 0 290 22" aria-hidden="true" className="my-2 max-w-full">
        <path d="M0 11H138" stroke="var(--fine)" strokeWidth="4" />
        {sealed.map((x) => (
          <g key={x}>
            <path d={`M${x} 6v11`} stroke="var(--ground)" strokeWidth="3.5" />
            <path d={`M${x} 6v11`} stroke="var(--fine)" strokeWidth="1.5" />
          </g>
        ))}
        <path d="M142 3l-5 16M153 3l-5 16" stroke="var(--needs)" strokeWidth="2.25" />
        <path d="M156 11H290" stroke="var(--edge)" strokeWidth="2" strokeDasharray="3 4" />
      </svg>
      <p className="t-small">{children}</p>
    </div>
  );
}
