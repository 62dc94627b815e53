import type { ReactNode } from 'react';
import { Neatline } from '../ui/neatline';
import { Verb } from '../ui/verbs';

export interface ConsentFrameProps {
  formNumber: string;
  site: { readonly name: string; readonly phone: string; readonly email: string };
  onBack?: (() => void) | undefined;
  /** The main action at the foot, within the thumb. */
  action?: ReactNode;
  children: ReactNode;
}

/** One part at a time over the whole screen: no navigation but back, and whom to ask at the foot. */
export function ConsentFrame({ formNumber, site, onBack, action, children }: ConsentFrameProps) {
  return (
    <div className="phone on-phone">
      <header>
        <div className="phone-head">
          {onBack ? (
            <button type="button" className="phone-back" aria-label="Back" onClick={onBack}>
              <Verb name="back" size={22} />
            </button>
          ) : null}
          <b>Consent, form {formNumber}</b>
        </div>
        <Neatline segments={24} gone={0} />
      </header>
      <main id="main" tabIndex={-1} className="phone-body">
        {children}
      </main>
      <div className="phone-foot">
        {action ? <div className="phone-action">{action}</div> : null}
        <p className="flex items-center gap-3 border-t border-rule-2 px-5 py-3 text-[15.5px] leading-[22px]">
          <Verb name="call" size={20} />
          <span>
            Ask before you decide: <a className="pad-44 font-semibold" href={`tel:${site.phone.replace(/[^\d+]/g, '')}`}>call {site.name}</a> on {site.phone}, or write to {site.email}
          </span>
        </p>
      </div>
    </div>
  );
}
