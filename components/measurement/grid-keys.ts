/** One column of the entry grid, in the order of work: the levels at which it takes a reading. */
export interface GridColumn {
  readonly side: 'left' | 'right';
  readonly trial: number;
  readonly levels: readonly number[];
}

/** One cell of the grid. */
export interface GridCell {
  readonly side: 'left' | 'right';
  readonly trial: number;
  readonly level: number;
}

/** Where a key leads: 'on' down the column and then to the head of the next, 'back' the same way in reverse. */
export type GridStep = 'on' | 'back';

/** Name of a cell: 'left 2 5' is left arm, trial 2, level 5, as the server names places too. */
export const cellName = ({ side, trial, level }: GridCell): string => `${side} ${trial} ${level}`;

/** The cell a name stands for; null for a name of anything else. */
export function cellOf(name: string): GridCell | null {
  const found = /^(left|right) ([123]) (\d{1,2})$/.exec(name);
  return found ? { side: found[1] === 'left' ? 'left' : 'right', trial: Number(found[2]), level: Number(found[3]) } : null;
}

/** Every cell in the order of work. */
export const cellsInOrder = (columns: readonly GridColumn[]): GridCell[] =>
  columns.flatMap(({ side, trial, levels }) => levels.map((level) => ({ side, trial, level })));

/** What a key means in the grid; null leaves it to the browser. Enter and Tab go the way of ↓, with Shift the way of ↑. */
export function stepOf({ key, shiftKey }: { key: string; shiftKey: boolean }): GridStep | null {
  if (key === 'ArrowDown') return 'on';
  if (key === 'ArrowUp') return 'back';
  if (key === 'Enter' || key === 'Tab') return shiftKey ? 'back' : 'on';
  return null;
}

/** The next cell that way; null beyond the first and the last, so that Tab leaves the grid there. */
export function nextCell(columns: readonly GridColumn[], at: GridCell, step: GridStep): GridCell | null {
  const cells = cellsInOrder(columns);
  const index = cells.findIndex((cell) => cellName(cell) === cellName(at));
  return index < 0 ? null : (cells[index + (step === 'on' ? 1 : -1)] ?? null);
}

const both = ['left', 'right'] as const;

/** The columns of a sitting: two trials of both arms, and a third where the two differ. */
export function columnsOf(levelCount: number, thirdAt: Readonly<Record<'left' | 'right', readonly number[]>>): GridColumn[] {
  const all = Array.from({ length: levelCount }, (_, level) => level);
  return [
    ...[1, 2].flatMap((trial) => both.map((side) => ({ side, trial, levels: all }))),
    ...both.filter((side) => thirdAt[side].length > 0).map((side) => ({ side, trial: 3, levels: thirdAt[side] })),
  ];
}
