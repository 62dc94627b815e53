'use client';

import { useEffect, useRef, type ReactNode } from 'react';
import type { TableChoice } from './data-table';
import type { TableColumn } from './plain-table';
import { Button } from './button';
import { Verb } from './verbs';

export interface TableHeadCellProps {
  column: Pick<TableColumn<never>, 'header' | 'numeric' | 'width' | 'headerHidden'>;
  sorted: false | 'asc' | 'desc';
  onSort?: (() => void) | undefined;
}

/** A column head; where it sorts, its word is a button and the direction is said in `aria-sort`. */
export function TableHeadCell({ column, sorted, onSort }: TableHeadCellProps) {
  const direction = sorted === 'asc' ? 'ascending' : sorted === 'desc' ? 'descending' : undefined;
  return (
    <th
      role="columnheader"
      scope="col"
      className={column.numeric ? 'numeric' : undefined}
      style={{ width: column.width }}
      aria-sort={onSort ? (direction ?? 'none') : undefined}
    >
      {onSort ? (
        <button type="button" className="sort-key" onClick={onSort}>
          {column.header}
          {sorted ? <Verb name={sorted === 'asc' ? 'up' : 'down'} size={13} /> : null}
        </button>
      ) : column.headerHidden ? (
        <span className="sr-only">{column.header}</span>
      ) : (
        column.header
      )}
    </th>
  );
}

/** The tick over the column of ticks: all, none or some of the rows in sight. */
export function ChooseAll({ choice, ids }: { choice: TableChoice; ids: readonly string[] }) {
  const box = useRef<HTMLInputElement>(null);
  const chosen = ids.filter((id) => choice.chosen.has(id)).length;
  const all = ids.length > 0 && chosen === ids.length;
  useEffect(() => {
    if (box.current) box.current.indeterminate = chosen > 0 && !all;
  }, [chosen, all]);
  return (
    <th role="columnheader" scope="col" className="choose">
      <input
        ref={box}
        type="checkbox"
        className="chk"
        checked={all}
        aria-label="Choose every row in sight"
        onChange={() => choice.onChange(new Set(all ? [] : ids))}
      />
    </th>
  );
}

/** The tick of one row. */
export function ChooseRow({ choice, id }: { choice: TableChoice; id: string }) {
  const toggle = () => {
    const next = new Set(choice.chosen);
    if (!next.delete(id)) next.add(id);
    choice.onChange(next);
  };
  return (
    <td role="cell" className="choose">
      <input type="checkbox" className="chk" checked={choice.chosen.has(id)} aria-label={`Choose ${choice.noun} ${id}`} onChange={toggle} />
    </td>
  );
}

export interface BulkTrayProps {
  /** '3 chosen, all answered'. */
  title: string;
  /** The reason's control. */
  children?: ReactNode;
  /** The verb with its number: 'Close 3 queries'. */
  action: ReactNode;
  onClear: () => void;
}

/** What will be done to the chosen rows, over the head of their table. */
export function BulkTray({ title, children, action, onClear }: BulkTrayProps) {
  return (
    <div className="tray" role="group" aria-label="What is chosen">
      <b className="mr-auto">{title}</b>
      {children}
      {action}
      <Button kind="link" onClick={onClear}>
        Clear
      </Button>
    </div>
  );
}
