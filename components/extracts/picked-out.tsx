import type { ExtractPreview } from '@/lib/extracts/preview-extract';
import { countOf, formatCount } from '../ui/format';
import { MarginPart } from '../ui/page';

/** What the check of the smallest group found, what it cost, and what it does not look at. */
export function PickedOut({ disclosure, isDone }: { disclosure: ExtractPreview['disclosure']; isDone: boolean }) {
  const { atLeast, people, smallestGroup, peopleWithAny, withheld } = disclosure;
  const total = withheld.reduce((sum, { values }) => sum + values, 0);
  return (
    <MarginPart title="Could someone be picked out?">
      <div className="t-small mt-1.5 grid gap-2 text-ink-2">
        {people === 0 ? (
          <p>Nobody is in it yet, so there is nothing to check.</p>
        ) : (
          <>
            <p>
              The smallest group of people who {isDone ? 'share' : 'would share'} all values below is <b>{countOf(smallestGroup, 'person', 'people')}</b>
              {smallestGroup < atLeast ? `, fewer than the ${atLeast} asked for, because no more are in it; every one of these values is withheld.` : `; at least ${atLeast} are asked for.`} For this {countOf(total, 'value')} of{' '}
              {countOf(peopleWithAny, 'person', 'people')} {isDone ? 'are' : 'would be'} withheld, the least important column first. A withheld value counts as one of its own.
            </p>
            <table role="table" className="w-full">
              <caption className="sr-only">Values withheld, by column, in the order of withholding</caption>
              <thead role="rowgroup">
                <tr role="row">
                  <th role="columnheader" scope="col" className="text-left font-normal">Value</th>
                  <th role="columnheader" scope="col" className="text-right font-normal">Withheld, of {formatCount(people)}</th>
                </tr>
              </thead>
              <tbody role="rowgroup">
                {withheld.map(({ column, label, values }) => (
                  <tr role="row" key={column} className="border-t border-rule">
                    <th role="rowheader" scope="row" className="py-0.5 text-left font-normal text-ink">{label}</th>
                    <td role="cell" className="t-num py-0.5 text-right text-ink">{formatCount(values)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </>
        )}
        <p>
          Not checked: what is measured again and again. Who knows two dates of a person can look for the days between them. Who holds two extracts can find nearly everybody measured in both, by arm volumes and body weight: the random numbers differ, the measurements do not. A group may also share one sensitive value.
        </p>
        <p>Nobody else has to approve an extract yet. Hand the files only to the recipient named.</p>
      </div>
    </MarginPart>
  );
}
