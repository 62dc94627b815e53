'use client';

import { useState, type ReactNode } from 'react';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { StruckValue } from '@/lib/review/earlier-values';
import { ArmChoice } from '../measurement/entry-parts';
import { formatNumber } from '../ui/format';
import { StruckBefore } from './field-notes';
import { anchorOf, itemLike, printBare, type ReviewItem, type ReviewRow } from './review-items';

export interface TapeTableProps {
  rows: readonly ReviewRow[];
  assessment: CompleteAssessmentView;
  currentKey: string | null;
  /** The value that the address leads to, by itself or by a note on it. */
  anchoredKey: string | null;
  struckOf: (key: string) => readonly StruckValue[];
  onChoose: (item: ReviewItem) => void;
  /** The sign at the left of a line: tick, dash, or the button that marks it. */
  gutter: (row: ReviewRow) => ReactNode;
}

const sides = ['left', 'right'] as const;
const sideWord = { left: 'Left', right: 'Right' } as const;

/** The arm in sight where there is room for one only: that of the value last chosen or led to, until the other is asked for. */
function useArm({ rows, currentKey, anchoredKey, onChoose }: Pick<TapeTableProps, 'rows' | 'currentKey' | 'anchoredKey' | 'onChoose'>) {
  const items = rows.flatMap((row) => row.items);
  const ledTo = currentKey ?? anchoredKey;
  const sideOf = (key: string | null) => items.find((item) => item.key === key)?.side;
  const [shown, setShown] = useState({ arm: sideOf(ledTo) ?? 'left', ledTo });
  if (shown.ledTo !== ledTo) setShown({ arm: sideOf(ledTo) ?? shown.arm, ledTo });
  const show = (arm: 'left' | 'right') => {
    setShown({ arm, ledTo });
    // What is chosen stays in sight: the same level on the other arm.
    const row = rows.find((one) => one.items.some(({ key }) => key === currentKey));
    const twin = row && itemLike(row, arm);
    if (twin) onChoose(twin);
  };
  return [shown.arm, show] as const;
}

/** The tape as it was saved: each reading a button that chooses it, the settled girth in bold. */
export function TapeTable(props: TapeTableProps) {
  const { rows, assessment, currentKey, struckOf, onChoose, gutter } = props;
  const [arm, showArm] = useArm(props);
  const trials = [...new Set(assessment.trialIds.map(({ trial }) => trial))].toSorted();
  const trialsOf = (side: 'left' | 'right') => trials.filter((trial) => assessment.trialIds.some((row) => row.side === side && row.trial === trial));
  const girths = { left: assessment.leftGirthsMm, right: assessment.rightGirthsMm };
  const idOf = (side: 'left' | 'right', trial: number) => assessment.trialIds.find((row) => row.side === side && row.trial === trial)?.id;
  return (
    <div className="tape-frame">
      <ArmChoice arm={arm} onArm={showArm} />
      <table className="tape-table" data-arm={arm}>
        <caption className="sr-only">Girths in centimetres by level, trial and arm</caption>
        <thead>
          <tr>
            <th className="tape-gutter">
              <span className="sr-only">Seen at source</span>
            </th>
            <th scope="col" className="tape-level">
              cm from wrist
            </th>
            {sides.map((side) => [
              ...trialsOf(side).map((trial) => (
                <th key={`${side} ${trial}`} scope="col" data-side={side}>
                  {sideWord[side]} {trial}
                </th>
              )),
              <th key={`${side} mean`} scope="col" data-side={side}>
                {trials.includes(3) ? 'Settled' : 'Mean'}
                <span className="sr-only">, {side}</span>
              </th>,
            ])}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, level) => (
            <tr key={row.key} className={row.items.some(({ key }) => key === currentKey) ? 'tape-now' : undefined}>
              <td className="tape-gutter">{gutter(row)}</td>
              <th scope="row" className="tape-level">
                {row.label}
              </th>
              {sides.map((side) => [
                ...trialsOf(side).map((trial) => {
                  const item = row.items.find(({ target }) => target.id === idOf(side, trial));
                  return (
                    <td key={`${side} ${trial}`} data-side={side}>
                      {item ? <Reading item={item} struck={struckOf(item.key)} current={item.key === currentKey} onChoose={onChoose} /> : null}
                    </td>
                  );
                }),
                <td key={`${side} mean`} className="tape-mean" data-side={side}>
                  {girths[side][level] == null ? '' : formatNumber((girths[side][level] ?? 0) / 10, 1)}
                </td>,
              ])}
            </tr>
          ))}
          <tr className="tape-sum">
            <td />
            <th scope="row" className="tape-level">
              Volume, mL
            </th>
            {sides.map((side) => [
              ...trialsOf(side).map((trial) => <td key={`${side} ${trial}`} data-side={side} />),
              <td key={`${side} mean`} className="tape-mean" data-side={side}>
                {formatNumber(side === 'left' ? assessment.leftVolumeMl : assessment.rightVolumeMl)}
              </td>,
            ])}
          </tr>
        </tbody>
      </table>
    </div>
  );
}

function Reading({ item, struck, current, onChoose }: { item: ReviewItem; struck: readonly StruckValue[]; current: boolean; onChoose: (item: ReviewItem) => void }) {
  return (
    <>
      <StruckBefore item={item} struck={struck} />
      <button type="button" id={anchorOf(item.key)} className={`tape-reading ${struck.length > 0 ? 'tape-changed' : ''}`} aria-pressed={current} aria-label={`${item.label}, ${printBare('girth', item.value)} cm`} onClick={() => onChoose(item)}>
        {printBare('girth', item.value)}
      </button>
    </>
  );
}
