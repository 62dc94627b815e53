import type { SessionLogged } from '@/lib/safety/log-session';
import type { LogView } from '@/lib/training/view-log';
import { formatDate } from '../../ui/format';
import { SentReportWords } from '../sent-report';

/** The session is in: what the rules say of it, plainly. No praise. */
export function DoneStep({ view, logged }: { view: LogView; logged: SessionLogged }) {
  const contact = logged.advice.some(({ contactSite }) => contactSite);
  return (
    <>
      <h1>Saved</h1>
      <p className="phone-lede">
        Your session of {formatDate(logged.on)} is logged{logged.late ? ', marked late because it was entered some days after' : ''}.
      </p>
      {logged.report ? <SentReportWords report={logged.report} /> : null}
      {logged.advice.map(({ rule, title, text }) => (
        <div className="phone-say" key={`${rule}${title}`}>
          <p>
            <b>{title}.</b> {text}
          </p>
        </div>
      ))}
      {contact && !logged.report ? (
        <p className="mt-4">
          <b>
            Call {view.site.name} on <a href={`tel:${view.site.phone.replace(/[^\d+]/g, '')}`}>{view.site.phone}</a> before your next session.
          </b>
        </p>
      ) : null}
      <p className="mt-5 text-[16px] leading-6 text-ink-2">Something wrong in it? Your site can correct it with you. This log does not replace your clinician’s advice.</p>
    </>
  );
}
