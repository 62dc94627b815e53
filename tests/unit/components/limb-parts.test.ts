import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, test } from 'vitest';
import { TapeTable } from '@/components/margin/tape-table';
import { partsOfReview } from '@/components/margin/review-items';
import { ArmDifference } from '@/components/measurement/arm-difference';
import { BeforeYouSave } from '@/components/measurement/before-you-save';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { ReviewView } from '@/lib/review/view-review';

const trial = (id: string, side: 'left' | 'right', number: number, circumferencesMm: number[]) => ({ id, side, trial: number, circumferencesMm, version: 1, savedAt: '' });
const passes = [trial('l1', 'left', 1, [228, 266]), trial('l2', 'left', 2, [229, 267]), trial('r1', 'right', 1, [377, 355]), trial('r2', 'right', 2, [378, 356])];
const assessment = {
  id: 'a1', version: 1, map: { startOffsetMm: 0, stepMm: 40, levelCount: 2 }, circumstances: {}, trials: passes, trialIds: passes,
  leftGirthsMm: [228.5, 266.5], rightGirthsMm: [377.5, 355.5], leftVolumeMl: 2000, rightVolumeMl: 2100,
} as unknown as CompleteAssessmentView;
const tape = partsOfReview({ visit: { id: 'v1', doneOn: '2026-12-03', version: 1 } as ReviewView['visit'], assessment }).find((part) => part.tape);

const table = (keys: { currentKey?: string; anchoredKey?: string }) =>
  renderToStaticMarkup(createElement(TapeTable, { rows: tape?.rows ?? [], assessment, currentKey: null, anchoredKey: null, struckOf: () => [], onChoose: () => undefined, gutter: () => null, ...keys }));

describe('the tape on the form', () => {
  test('settled girths round halves up on both arms', () => {
    const settled = [...table({}).matchAll(/<td class="tape-mean" data-side="(left|right)">([\d.]+)<\/td>/g)].map(([, side, text]) => [side, text]);
    expect(settled).toEqual([['left', '22.9'], ['right', '37.8'], ['left', '26.7'], ['right', '35.6']]);
  });
  test('where there is room for one arm, that of the value chosen or led to is in sight', () => {
    const right = tape?.rows[1]?.items.find(({ side }) => side === 'right')?.key ?? '';
    const left = tape?.rows[1]?.items.find(({ side }) => side === 'left')?.key ?? '';
    expect(table({})).toContain('<table class="tape-table" data-arm="left">');
    expect(table({ anchoredKey: right })).toContain('<table class="tape-table" data-arm="right">');
    expect(table({ currentKey: left, anchoredKey: right })).toContain('<table class="tape-table" data-arm="left">');
    expect(table({ anchoredKey: right })).toMatch(/aria-pressed="true">Right arm<\/button>/);
  });
  test('every cell but sign and level says which arm it is of', () => {
    const cells = [...table({}).matchAll(/<t[dh](?: [^>]*)?>/g)].map(([tag]) => tag).filter((tag) => !/tape-gutter|tape-level|<td>/.test(tag));
    expect(cells).toHaveLength(6 * 4);
    expect(cells.filter((tag) => !tag.includes('data-side='))).toEqual([]);
  });
});

describe('left minus right', () => {
  const draw = (nowMm: (number | null)[], baselineMm: (number | null)[] | null) => renderToStaticMarkup(createElement(ArmDifference, { map: { startOffsetMm: 0, stepMm: 40 }, nowMm, baselineMm }));
  test('says every figure aloud', () => {
    expect(draw([-12.5, null, 3], null)).toContain('aria-label="Left minus right in centimetres: at 0 cm \u22121.3, at 8 cm +0.3"');
  });
  test('bars, strokes and figures stay inside the figure, however large the difference', () => {
    for (const [now, before] of [[[-120, 4], [10, -90]], [[150, 0], [-3, 160]], [[1, -1], [0, 0]], [[0, 0], null]] as const) {
      const svg = draw([...now], before && [...before]);
      const bars = [...svg.matchAll(/<rect x="([-\d.]+)" y="[\d.]+" width="([\d.]+)"/g)].flatMap(([, x, width]) => [Number(x), Number(x) + Number(width)]);
      const strokes = [...svg.matchAll(/d="M([-\d.]+) [\d.]+v18"/g)].map(([, x]) => Number(x));
      const figures = [...svg.matchAll(/<text x="([-\d.]+)" y="[\d.]+" class="arm-figure/g)].map(([, x]) => Number(x));
      expect(bars).toHaveLength(4);
      expect(figures).toHaveLength(2);
      for (const x of [...bars, ...strokes]) expect(x >= 0 && x <= 120).toBe(true);
      for (const x of figures) expect(x <= 170 - 42).toBe(true);
    }
  });
});

describe('before saving', () => {
  const doubt = { check: 'weight.range', severity: 'soft' as const, place: 'weight', message: '206 kg is unusual.', figure: '206 kg', likely: { typed: '93.4', unit: 'kg' } };
  const list = (reason: string | null) => renderToStaticMarkup(createElement(BeforeYouSave, { doubts: [{ ...doubt, reason }], map: { startOffsetMm: 0, stepMm: 40 }, onMeasureAgain: () => undefined, onKeep: () => undefined, onChange: () => undefined }));
  test('a likely figure is offered beside keeping the other with a reason, and no longer once it is kept', () => {
    expect(list(null)).toContain('Change to 93.4 kg');
    expect(list(null)).toContain('Keep 206 kg, give a reason');
    expect(list('Weighed twice')).not.toContain('Change to');
  });
});
