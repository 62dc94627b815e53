import Link from 'next/link';
import type { ReactNode } from 'react';
import { Caution } from '../ui/caution';
import { Neatline } from '../ui/neatline';
import { Mark } from '../ui/signs';
import { Verb } from '../ui/verbs';
import type { NavItem } from './staff-shell';

export interface PhoneShellProps {
  study: string;
  /** The participant code, or what stands at the right of a step: 'Wed 3 Mar', '4 of 12'. */
  right?: ReactNode;
  /** Inside a task the head is a way back with the task's name, and the tabs give way. */
  back?: { href: string; title: string };
  /** The participant's own two years, 0 to 1. */
  gone: number;
  /** Five tabs, each at least 44 px high. */
  tabs: readonly NavItem[];
  /** Where urgent care is explained. The band is on every screen but those that say it themselves. */
  urgentHref: string;
  hideCaution?: boolean;
  /** The main action at the foot, within the thumb. */
  action?: ReactNode;
  /** Footer sentences: times zone, who to ask. */
  footer?: ReactNode;
  children: ReactNode;
}

/** Every participant page, made for one hand at 390 px and centred on wider screens. */
export function PhoneShell({ study, right, back, gone, tabs, urgentHref, hideCaution, action, footer, children }: PhoneShellProps) {
  return (
    <div className="phone on-phone">
      <header>
        <div className="phone-head">
          {back ? (
            <Link className="phone-back" href={back.href} aria-label="Back">
              <Verb name="back" size={22} />
            </Link>
          ) : (
            <Mark size={26} />
          )}
          <b>{back ? back.title : study}</b>
          {right ? <span className="phone-right">{right}</span> : null}
        </div>
        <Neatline segments={24} gone={gone} />
      </header>
      <main id="main" tabIndex={-1} className="phone-body">
        {children}
        {footer ? <div className="phone-footer">{footer}</div> : null}
      </main>
      <div className="phone-foot">
        {action ? <div className="phone-action">{action}</div> : null}
        {hideCaution ? null : <UrgentBand href={urgentHref} />}
        {back ? null : <PhoneTabs tabs={tabs} />}
      </div>
    </div>
  );
}

/** The caution at the foot of each participant screen. */
export function UrgentBand({ href }: { href: string }) {
  return (
    <Caution as="band">
      Hot, red or suddenly swollen arm, or fever? <Link href={href}>Get urgent care</Link>
    </Caution>
  );
}

function PhoneTabs({ tabs }: { tabs: readonly NavItem[] }) {
  return (
    <nav className="phone-tabs" aria-label="Main">
      {tabs.map(({ href, label, current, count }) => (
        <Link key={href} href={href} aria-current={current ? 'page' : undefined}>
          <span>
            {label}
            {count ? (
              <i>
                {count}
                <span className="sr-only"> to do</span>
              </i>
            ) : null}
          </span>
        </Link>
      ))}
    </nav>
  );
}
