import type { ProofView } from '@/lib/audit/view-proof';
import { SealedDays } from '../chart/small-charts';
import { formatCount, formatDate, formatMoment } from '../ui/format';
import { CutLine, SealedLine } from '../ui/signs';

const fours = (hash: string): string => hash.slice(0, 16).replace(/(.{4})(?=.)/g, '$1 ');

/** How far the trail is sealed, the entries of the last weeks, and what a seal proves. */
export function Proof({ proof }: { proof: ProofView }) {
  const { seal, isSound, days, today } = proof;
  const [firstDay] = days;
  return (
    <div className="columns mt-4">
      <div className="min-w-0">
        <div className="flex items-start gap-4">
          {isSound ? <SealedLine /> : <CutLine />}
          <div>
            <h2 className={isSound ? 'is-fine' : 'is-needs'}>{!seal ? 'No seal yet' : isSound ? `Sealed, from the first entry to ${formatCount(seal.lastEntryId)}` : 'The last seal does not agree with itself'}</h2>
            <p>
              {seal
                ? `${formatCount(seal.treeSize)} entries stand under one seal, made ${formatMoment(new Date(seal.sealedAt), 'UTC')} UTC.`
                : 'Seals are made by a job every five minutes; none has run yet, so nothing is proven so far.'}
            </p>
          </div>
        </div>
        <div className="mt-3">
          <SealedDays
            days={days}
            openDay={today}
            marks={[...(firstDay ? [{ day: firstDay.day, words: formatDate(firstDay.day) }] : []), { day: today, words: 'today, open' }]}
            label={`Entries a day in your reach over ${days.length} days, ${formatCount(days.reduce((sum, { entries }) => sum + entries, 0))} in all.`}
          />
        </div>
      </div>
      <aside className="margin" aria-label="The proof">
        <section>
          <h3>The proof</h3>
          <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1">
            <dt className="text-ink-2">Last seal</dt>
            <dd className="t-num text-right">{seal ? fours(seal.rootHash) : 'none'}</dd>
            <dt className="text-ink-2">Entries under it</dt>
            <dd className="t-num text-right">{seal ? formatCount(seal.treeSize) : '0'}</dd>
          </dl>
          <p className="t-small mt-2 text-ink-2">
            A seal is the root of a hash tree over every entry (RFC 6962). An altered or missing entry gives another root. Each root is also kept as a head outside the data base. scripts/verify-audit works the root out again from all entries, without this application, and compares it with those heads; this page has not done so.
          </p>
        </section>
      </aside>
    </div>
  );
}
