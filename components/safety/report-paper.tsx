import Link from 'next/link';
import type { ReportView } from '@/lib/safety/view-report';
import { Caution } from '../ui/caution';
import { formatDate, formatMoment } from '../ui/format';
import { FactStrip } from '../ui/page';

/** What the participant said, what they were told, and what the site is asked for. */
export function ReportPaper({ report }: { report: ReportView }) {
  const { timeZone, review, signs, note } = report;
  const at = (moment: string | null, none: string) => (moment === null ? none : formatMoment(new Date(moment), timeZone));
  return (
    <>
      {report.state === 'reviewed' ? null : (
        <div className="mt-5">
          <Caution title={`${report.level}.`}>{report.siteText} The protocol’s clock does not replace clinical judgement.</Caution>
        </div>
      )}
      <FactStrip
        facts={[
          { term: 'Participant', value: <Link href={`/participants/${report.participantCode}`}>{report.participantCode}</Link> },
          { term: 'Affected side', value: report.affectedSide },
          { term: 'Noticed', value: formatDate(report.noticedOn) },
          { term: 'Reported', value: at(report.reportedAt, '') },
          { term: 'Answer by', value: report.isOverdue ? <b className="text-needs">{at(report.dueAt, '')}, past</b> : at(report.dueAt, 'nothing asked') },
          { term: 'Read', value: at(report.readAt, 'not yet') },
          { term: 'Training', value: report.trainingHeld ? 'held' : 'not held' },
        ]}
      />
      <section className="mt-6 max-w-[720px]">
        <h2>What was said</h2>
        {signs.length > 0 ? (
          <ul className="mt-2 list-disc pl-5">
            {signs.map((sign) => (
              <li key={sign}>{sign}</li>
            ))}
          </ul>
        ) : (
          <p className="mt-2">{report.said}</p>
        )}
        {note ? <blockquote className="mt-3 border-l-2 border-rule-2 pl-4">{note}</blockquote> : null}
        <h3 className="mt-5">Told at once</h3>
        <p className="mt-1 text-ink-2">{report.toldParticipant}</p>
      </section>
      {review ? (
        <section className="mt-6 max-w-[720px]">
          <h2>Reviewed: {review.outcome}</h2>
          <p className="mt-2">{review.note}</p>
          <p className="t-small mt-1 text-ink-2">
            {review.by}, {at(review.at, '')}
          </p>
        </section>
      ) : null}
    </>
  );
}
