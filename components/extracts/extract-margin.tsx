import type { ExtractView } from '@/lib/extracts/view-extract';
import { countOf, formatMoment } from '../ui/format';
import { Ledger, type LedgerStep } from '../ui/ledger';
import { MarginPart } from '../ui/page';
import { PickedOut } from './picked-out';

const at = (moment: string): string => formatMoment(new Date(moment), 'UTC');

function stepsOf({ state, requestedAt, requestedLabel, purpose, asOf, readyAt }: ExtractView): LedgerStep[] {
  const isReady = state === 'ready';
  return [
    { key: 'asked', state: 'done', title: 'Asked for', when: at(requestedAt), children: `${requestedLabel}: “${purpose}”` },
    { key: 'read', state: isReady ? 'done' : state === 'waiting' ? 'to-come' : 'now', title: 'Read and written', ...(isReady ? { when: at(asOf), children: 'The record as it stood at this moment' } : {}) },
    { key: 'ready', state: isReady ? 'done' : 'to-come', title: 'Ready, checksums written', ...(readyAt ? { when: at(readyAt) } : {}) },
  ];
}

/** From asking to the files, who is in it, and what was left out. */
export function ExtractMargin({ extract }: { extract: ExtractView }) {
  const { counts, disclosure, removed, state } = extract;
  return (
    <>
      <MarginPart title="From asking to the files">
        <div className="mt-3">
          <Ledger label="Steps of this extract" steps={stepsOf(extract)} />
        </div>
      </MarginPart>
      {state === 'ready' ? (
        <MarginPart title="Who is in it">
          <p className="t-small mt-1.5">
            {countOf(counts['included'] ?? 0, 'person', 'people')} of {counts['enrolled'] ?? 0} enrolled. {counts['saidNo'] ?? 0} said no to sharing and {counts['notAsked'] ?? 0} were not asked; they are in no file. {counts['cutShort'] ?? 0} asked for no further data and are in it until their day.
          </p>
        </MarginPart>
      ) : null}
      {disclosure ? <PickedOut disclosure={disclosure} isDone /> : null}
      <MarginPart title="Days, not dates">
        <p className="t-small mt-1.5 text-ink-2">Every date becomes days from that person’s enrolment: day 1 is the day of enrolment and there is no day 0. The season is gone with it. The day of surgery is a band of weeks before enrolment.</p>
      </MarginPart>
      {removed.length > 0 ? (
        <MarginPart title="Left out of every file">
          <p className="t-small mt-1.5 text-ink-2">Name, address, phone, date of birth and signatures are never read. Of what is read, {countOf(removed.length, 'variable')} stay here.</p>
          <details className="chart-table">
            <summary>Show which</summary>
            <ul className="t-small text-ink-2">
              {removed.map((variable) => (
                <li key={variable} className="border-b border-rule py-1">
                  {variable}
                </li>
              ))}
            </ul>
          </details>
        </MarginPart>
      ) : null}
    </>
  );
}
