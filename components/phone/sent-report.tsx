import type { SentReport } from '@/lib/safety/keep-report';
import { formatNearDate, formatTime } from '../ui/format';

const phoneHref = (phone: string): string => `tel:${phone.replace(/[^\d+]/g, '')}`;

/** What happens now that the site has the report. */
export function SentReportWords({ report: { title, text, dueAt, holdTraining, site } }: { report: SentReport }) {
  const due = dueAt === null ? null : new Date(dueAt);
  return (
    <div className="phone-say">
      <p>
        <b>{title}.</b> {text}
      </p>
      <p className="mt-2">
        {site.name} has your report.{' '}
        {due === null ? 'Nothing more is asked of you.' : `The study asks them to look at it by ${formatNearDate(due, site.timeZone)}, ${formatTime(due, site.timeZone)}. Nobody reads reports around the clock: do what stands above without waiting.`}{' '}
        {holdTraining ? 'Your training waits until they have looked at it. ' : ''}
        To reach them sooner call <a className="font-semibold" href={phoneHref(site.phone)}>{site.phone}</a>.
      </p>
    </div>
  );
}
