'use client';

import type { KeptFinding } from '@/lib/measurement/findings';
import type { HeldValue } from '@/lib/review/field-history';
import type { StruckValue } from '@/lib/review/earlier-values';
import { countOf, formatMoment } from '../ui/format';
import { EarlierValue, Note, SiteWords, ValueHistory } from '../ui/note';
import { printBare, printValue, type ReviewItem } from './review-items';

/** Values that stood here before, struck, in front of the one that stands now. */
export function StruckBefore({ item, struck }: { item: ReviewItem; struck: readonly StruckValue[] }) {
  return struck.map(({ at, value }) => (
    <span key={at}>
      <EarlierValue>{printBare(item.kind, value)}</EarlierValue>{' '}
    </span>
  ));
}

/** Why a value changed: from the page itself, without asking the server again. */
export function ChangedNote({ item, struck, timeZone }: { item: ReviewItem; struck: readonly StruckValue[]; timeZone: string }) {
  const first = struck[0];
  if (!first) return null;
  const values = struck.map(({ replacedBy, reason, label, at }, index) => ({
    value: printBare(item.kind, replacedBy),
    reason: `“${reason}”`,
    by: `${label}, ${formatMoment(new Date(at), timeZone)}`,
    current: index === struck.length - 1,
  }));
  return (
    <Note kind="history" state="History" number={`, changed ${struck.length === 1 ? 'once' : countOf(struck.length, 'time')}`}>
      <ValueHistory values={[{ value: printBare(item.kind, first.value), reason: 'first saved', by: '' }, ...values]} />
    </Note>
  );
}

/** Everything a field has held, asked for by `h`. */
export function HistoryNote({ item, held, timeZone, onClose }: { item: ReviewItem; held: readonly HeldValue[] | null; timeZone: string; onClose: () => void }) {
  const values = (held ?? []).map(({ value, reason, label, at }, index, all) => ({
    value: printBare(item.kind, value),
    reason: reason ? `“${reason}”` : index === 0 ? 'first entered' : 'typed anew before saving',
    by: `${label}, ${formatMoment(new Date(at), timeZone)}`,
    current: index === all.length - 1,
  }));
  return (
    <Note
      kind="history"
      state="History"
      number={held ? (held.length > 1 ? `, ${countOf(held.length, 'value')}` : ', as first entered') : ''}
      actions={
        <button type="button" className="btn-link" onClick={onClose}>
          Close the history
        </button>
      }
    >
      {held ? <ValueHistory values={values} /> : <p role="status">Reading the trail</p>}
    </Note>
  );
}

/** A doubtful value that was kept with a reason when the form was saved: no query, the explanation is here already. */
export function KeptNote({ finding, item, assessorLabel, savedAt }: { finding: KeptFinding; item: ReviewItem; assessorLabel: string | null; savedAt: string }) {
  return (
    <Note kind="closed" state="Kept" number={`, ${printValue(item.kind, item.value)}`}>
      <p className="note-by">{finding.message}</p>
      <SiteWords by={[assessorLabel, savedAt].filter(Boolean).join(', ')}>{finding.reason}</SiteWords>
    </Note>
  );
}
