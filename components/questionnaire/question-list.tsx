import Link from 'next/link';
import type { QuestionnaireList, QuestionnaireRow } from '@/lib/questionnaires/list-questionnaires';
import { countOf, formatDate, formatDue } from '../ui/format';
import { Gauge } from '../ui/gauge';

/** Open now, coming, past. */
export function QuestionList({ list }: { list: QuestionnaireList }) {
  const { open, soon, past, today } = list;
  return (
    <>
      <h1>Questions</h1>
      <p className="phone-lede">
        {open.length === 0 ? 'Nothing is open now.' : 'You may stop at any question and go on later, here or on another device.'}
      </p>
      {open.length > 0 ? (
        <ul className="phone-list mt-5 border-t border-rule">
          {open.map((row) => (
            <Open key={row.id} row={row} today={today} />
          ))}
        </ul>
      ) : null}
      {soon.length > 0 ? (
        <section className="mt-8">
          <h2>To come</h2>
          <ul className="phone-list mt-2 border-t border-rule">
            {soon.map(({ id, title, opensOn, closesOn }) => (
              <li key={id}>
                {title}
                <span className="block text-[16px] text-ink-2">
                  {formatDate(opensOn)} to {formatDate(closesOn)}
                </span>
              </li>
            ))}
          </ul>
        </section>
      ) : null}
      {past.length > 0 ? (
        <section className="mt-8">
          <h2>Past</h2>
          <ul className="phone-list mt-2 border-t border-rule">
            {past.map(({ id, title, submittedOn, closesOn, isLate }) => (
              <li key={id}>
                {title}
                <span className="block text-[16px] text-ink-2">
                  {submittedOn === null ? `closed on ${formatDate(closesOn)}, not sent` : `sent on ${formatDate(submittedOn)}${isLate ? ', after its day' : ''}`}
                </span>
              </li>
            ))}
          </ul>
        </section>
      ) : null}
      <p className="mt-6 text-[16px] leading-6 text-ink-2">Nobody reads answers around the clock. If your arm has changed, <Link className="font-semibold" href="/report">tell us there</Link>.</p>
    </>
  );
}

function Open({ row: { id, title, minutes, itemCount, doneCount, state, closesOn }, today }: { row: QuestionnaireRow; today: string }) {
  return (
    <li>
      <Link className="pad-44 font-semibold" href={`/questions/${id}`}>
        {title}
      </Link>
      <span className="block text-[16px] text-ink-2">
        {countOf(itemCount, 'question')}, about {countOf(minutes, 'minute')}. Open until {formatDate(closesOn)}, closes {formatDue(closesOn, today)}.
      </span>
      {state === 'in progress' ? <Gauge state="part" level={doneCount / itemCount} word={`${doneCount} of ${itemCount} answered or left out`} /> : null}
    </li>
  );
}
