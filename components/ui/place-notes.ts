/** Room between two notes, pixels. */
const gap = 20;
/** From the margin's rule to the notes, pixels. */
const inset = 44;

export interface NoteBox {
  /** Where the line it speaks of runs. */
  anchorY: number;
  height: number;
}

/**
 * Tops of notes that keep the order of their lines and do not overlap: each
 * stands at its line or lower, and when the foot of the page is reached they
 * are pulled up again from below. Notes taller than the page start at its head.
 */
export function stackNotes(notes: readonly NoteBox[], pageHeight: number, head = 20): number[] {
  let y = head;
  const tops = notes.map(({ anchorY, height }) => {
    const top = Math.max(y, anchorY - 1);
    y = top + height + gap;
    return top;
  });
  let limit = pageHeight - 24;
  for (let index = tops.length - 1; index >= 0; index -= 1) {
    const top = Math.min(tops[index] ?? 0, limit - (notes[index]?.height ?? 0));
    tops[index] = Math.max(head, top);
    limit = (tops[index] ?? 0) - gap;
  }
  return tops;
}

/** Puts the notes of a sheet at their lines and draws the hairlines; undoes both where the margin has folded. */
export function placeNotes(sheet: HTMLElement): void {
  const leaders = sheet.querySelector<SVGElement>(':scope > svg.sheet-leaders');
  const body = sheet.querySelector<HTMLElement>(':scope > .sheet-body');
  if (!leaders || !body) return;
  const folded = !window.matchMedia('(min-width: 1101px)').matches;
  sheet.classList.toggle('sheet-placed', !folded);
  const notes = [...sheet.querySelectorAll<HTMLElement>('[data-note-for]')];
  if (folded) {
    for (const note of notes) note.style.removeProperty('top');
    leaders.replaceChildren();
    return;
  }
  const frame = sheet.getBoundingClientRect();
  const marginX = body.getBoundingClientRect().right - frame.left;
  const placed = notes.flatMap((note) => {
    const anchor = document.getElementById(note.dataset.noteFor ?? '');
    return anchor ? [{ note, height: note.getBoundingClientRect().height, ...anchorPoint(anchor, frame) }] : [];
  });
  const tops = stackNotes(placed, Math.max(frame.height, 0));
  const paths = placed.map((item, index) => {
    const top = tops[index] ?? item.anchorY;
    item.note.style.left = `${marginX + inset}px`;
    item.note.style.top = `${top}px`;
    return leader(item, marginX, top, lineColour(item.note));
  });
  leaders.replaceChildren(...paths);
}

interface Anchor {
  anchorX: number;
  anchorY: number;
  inTable: boolean;
}

/** From a value the line leaves at its right; from a table cell it runs along the foot of the row, never through figures. */
function anchorPoint(anchor: HTMLElement, frame: DOMRect): Anchor {
  const box = anchor.getBoundingClientRect();
  const cell = anchor.closest('td');
  if (cell) return { anchorX: box.left - frame.left - 2, anchorY: cell.getBoundingClientRect().bottom - frame.top - 0.5, inTable: true };
  return { anchorX: box.right - frame.left + 8, anchorY: box.top + box.height / 2 - frame.top, inTable: false };
}

function lineColour(note: HTMLElement): string {
  const inner = note.querySelector<HTMLElement>('.note');
  return inner ? getComputedStyle(inner).getPropertyValue('--line') : 'var(--edge)';
}

function leader({ anchorX, anchorY, inTable }: Anchor, marginX: number, top: number, colour: string): SVGPathElement {
  const bend = marginX - 26;
  const end = marginX + inset;
  const y = top + 0.75;
  const rest = Math.abs(y - anchorY) < 1.5 ? `H${end}` : `C${bend + 34} ${anchorY} ${end - 34} ${y} ${end} ${y}`;
  const path = document.createElementNS('http://www.w3.org/2000/svg', 'path');
  path.setAttribute('d', `M${anchorX} ${anchorY}H${Math.max(bend, anchorX)}${rest}`);
  path.setAttribute('fill', 'none');
  path.setAttribute('stroke', colour);
  path.setAttribute('stroke-width', inTable ? '1.5' : '1.25');
  return path;
}
