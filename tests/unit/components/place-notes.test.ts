import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { stackNotes } from '@/components/ui/place-notes';

describe('notes in the margin', () => {
  it('a note alone stands at its line', () => expect(stackNotes([{ anchorY: 200, height: 90 }], 800)).toEqual([199]));
  it('two that collide: the lower moves down', () => {
    expect(
      stackNotes(
        [
          { anchorY: 100, height: 120 },
          { anchorY: 143, height: 60 },
        ],
        800,
      ),
    ).toEqual([99, 239]);
  });
  it('at the foot they are pulled up from below', () => {
    expect(
      stackNotes(
        [
          { anchorY: 300, height: 100 },
          { anchorY: 380, height: 100 },
        ],
        424,
      ),
    ).toEqual([180, 300]);
  });
  it('keep their order and never overlap while the page has room', () => {
    const note = fc.record({ anchorY: fc.integer({ min: 0, max: 900 }), height: fc.integer({ min: 20, max: 120 }) });
    fc.assert(
      fc.property(fc.array(note, { maxLength: 6 }), (unsorted) => {
        const notes = [...unsorted].sort((a, b) => a.anchorY - b.anchorY);
        const tops = stackNotes(notes, 1000);
        tops.slice(1).forEach((top, index) => expect(top).toBeGreaterThanOrEqual((tops[index] ?? 0) + (notes[index]?.height ?? 0) + 20));
      }),
    );
  });
});
