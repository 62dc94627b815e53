'use client';

import type { KeyboardEvent } from 'react';
import { flushSync } from 'react-dom';
import { formatNumber } from '../ui/format';
import { cellName, nextCell, stepOf, type GridCell, type GridColumn } from './grid-keys';
import type { Typed } from './typed-sitting';

export interface EntryGridProps {
  columns: readonly GridColumn[];
  map: { readonly startOffsetMm: number; readonly stepMm: number; readonly levelCount: number };
  typed: Typed;
  onType: (name: string, text: string) => void;
  /** A cell was left, by whatever way: what stands in it is whole. */
  onLeaveCell: () => void;
  /** A column was left: what it holds can be saved. */
  onLeaveColumn: () => void;
  /** Sentences of what is doubtful, by cell. */
  doubts: ReadonlyMap<string, string>;
  /** Hides the readings of trial 1 for an unbiased second. */
  firstCovered: boolean;
  /** Saved: the cells are read, not typed. */
  readOnly?: boolean;
  /** The arm in sight where there is room for one only. */
  arm: 'left' | 'right';
  onArm: (arm: 'left' | 'right') => void;
}

/** Id of a cell's control. */
export const cellId = (name: string): string => `girth-${name.replaceAll(' ', '-')}`;

const sideWord = { left: 'Left', right: 'Right' } as const;

/** The grid in the order of work: down each column, then to the head of the next. */
export function EntryGrid(props: EntryGridProps) {
  const { columns, map, arm } = props;
  const trials = [...new Set(columns.map(({ trial }) => trial))];
  return (
    <table className="entry-grid" data-arm={arm}>
      <caption className="sr-only">Girths in centimetres, wrist upward</caption>
      <thead>
        <tr>
          <td />
          {trials.map((trial) => (
            <th key={trial} scope="colgroup" colSpan={columns.filter((column) => column.trial === trial).length} className="entry-trial">
              {trial === 3 ? 'Third' : `Trial ${trial}`}
            </th>
          ))}
        </tr>
        <tr>
          <th scope="col" className="entry-mark">
            cm from
            <br />
            wrist
          </th>
          {columns.map(({ side, trial }) => (
            <th key={`${side} ${trial}`} scope="col" data-side={side}>
              <span className="entry-side">{sideWord[side]}</span>
              <span className="entry-phone">{trial === 3 ? 'Third' : `Trial ${trial}`}</span>
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {Array.from({ length: map.levelCount }, (_, level) => (
          <tr key={level}>
            <th scope="row" className="entry-level t-num">
              {formatNumber((map.startOffsetMm + level * map.stepMm) / 10, 0)}
            </th>
            {columns.map((column) => (
              <Cell key={`${column.side} ${column.trial}`} {...props} column={column} level={level} />
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Cell({ column, level, columns, map, typed, onType, onLeaveCell, onLeaveColumn, doubts, firstCovered, readOnly, onArm }: EntryGridProps & { column: GridColumn; level: number }) {
  const { side, trial, levels } = column;
  const cell: GridCell = { side, trial, level };
  const name = cellName(cell);
  const text = typed[name] ?? '';
  const doubt = doubts.get(name);
  const move = moveFrom({ cell, columns, onArm, onLeaveCell, onLeaveColumn });
  if (!levels.includes(level)) return <td data-side={side} data-trial={trial} className="entry-none" />;
  const hidden = firstCovered && trial === 1;
  const label = `${sideWord[side]} arm, ${(map.startOffsetMm + level * map.stepMm) / 10} cm, trial ${trial}, in cm`;
  if (readOnly)
    return (
      <td data-side={side} data-trial={trial} className="entry-read t-num">
        {text}
      </td>
    );
  return (
    <td data-side={side} data-trial={trial} className={text ? undefined : 'entry-empty'}>
      <input
        id={cellId(name)}
        className={`entry-cell ${doubt ? 'entry-doubt' : ''}`}
        inputMode="decimal"
        enterKeyHint="next"
        autoComplete="off"
        aria-label={label}
        aria-invalid={doubt ? true : undefined}
        aria-describedby={doubt ? `doubt-${cellId(name)}` : undefined}
        value={hidden && text ? '··' : text}
        readOnly={hidden}
        onChange={(event) => onType(name, event.target.value.slice(0, 8))}
        onBlur={onLeaveCell}
        onFocus={(event) => {
          onArm(side);
          event.target.select();
        }}
        onKeyDown={(event) => {
          if (event.key === 'Escape') {
            event.preventDefault();
            if (!hidden) onType(name, '');
          } else move(event);
        }}
      />
    </td>
  );
}

/** Follows a key to the next cell; where there is one arm in sight, that arm comes into sight first. */
function moveFrom({ cell, columns, onArm, onLeaveCell, onLeaveColumn }: Pick<EntryGridProps, 'columns' | 'onArm' | 'onLeaveCell' | 'onLeaveColumn'> & { cell: GridCell }) {
  return (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.altKey || event.ctrlKey || event.metaKey) return;
    const step = stepOf(event);
    if (step === null) return;
    const next = nextCell(columns, cell, step);
    if (event.key !== 'Tab' || next) event.preventDefault();
    // Enter in the last cell moves nowhere, and still says that the value is whole.
    onLeaveCell();
    if (!next || next.side !== cell.side || next.trial !== cell.trial) onLeaveColumn();
    if (!next) {
      if (event.key === 'Tab' && step === 'on') lastInOrderOfPage(event.currentTarget)?.focus();
      return;
    }
    flushSync(() => onArm(next.side));
    document.getElementById(cellId(cellName(next)))?.focus();
  };
}

/** The order of work ends at a third reading in the middle of the table; from there Tab would lead back into it for ever. */
function lastInOrderOfPage(cell: HTMLInputElement): HTMLInputElement | undefined {
  return [...(cell.closest('table')?.querySelectorAll('input') ?? [])].findLast((input) => input.offsetParent !== null);
}
