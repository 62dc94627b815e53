import type { ReactNode } from 'react';
import { WeekAxisHead, WeekMark, type WeekAxis, type WeekWindow } from '../chart/week-axis';

export interface WorkGroupProps {
  /** 'Past due', 'Today, Wednesday 3 March'. */
  title: string;
  count: number;
  axis: WeekAxis;
  /** The first group draws the axis itself; the others only its line of today. */
  first?: boolean;
  children: ReactNode;
}

/** One group of the work list. All rows of all groups share one axis of weeks and one line of today. */
export function WorkGroup({ title, count, axis, first, children }: WorkGroupProps) {
  return (
    <section className="work-group">
      <div className="work-head">
        <h2 className="t-small-head">
          {title} <span className="t-num text-[14px] text-ink-2">{count}</span>
        </h2>
        <div className="work-axis">
          <WeekAxisHead axis={axis} labelled={first ?? false} />
        </div>
      </div>
      <ol>{children}</ol>
    </section>
  );
}

export interface WorkRowProps {
  /** '17 Feb', '10:00', 'by 17:00'. */
  when: string;
  /** '14 days late', 'closes 8 Mar'. */
  whenDetail?: string;
  late?: boolean;
  /** 'Visit', 'Query', 'Report', 'Consent'. */
  kind: string;
  /** The participant code, linked. */
  code: ReactNode;
  title: ReactNode;
  detail?: ReactNode;
  axis: WeekAxis;
  window?: WeekWindow;
  /** A stacked Gauge. */
  state: ReactNode;
  /** The verb the row ends in. */
  action: ReactNode;
}

/** One piece of work: when, what, where on the axis, its state, the verb. */
export function WorkRow({ when, whenDetail, late, kind, code, title, detail, axis, window, state, action }: WorkRowProps) {
  return (
    <li className="work-row">
      <p className="work-when">
        <b>{when}</b>
        {whenDetail ? <span className={late ? 'is-needs' : undefined}>{whenDetail}</span> : null}
      </p>
      <p className="work-kind">{kind}</p>
      <div className="work-what">
        <p>
          <span className="mr-2.5">{code}</span>
          <b>{title}</b>
        </p>
        {detail ? <p className="work-detail">{detail}</p> : null}
      </div>
      <div className="work-axis">
        <WeekMark axis={axis} window={window} />
      </div>
      <div className="work-state">{state}</div>
      <div className="work-do">{action}</div>
    </li>
  );
}
