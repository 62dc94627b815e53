import { defineEditCheck } from './define-edit-check';

/** Both arms of one sitting, combined girths. */
export interface BothArms {
  readonly leftMm: readonly (number | null)[];
  readonly rightMm: readonly (number | null)[];
}

export const armsIdentical = defineEditCheck<BothArms>({
  id: 'arms.identical',
  version: 1,
  severity: 'soft',
  uses: 'this-sitting',
  title: 'Left equals right at every level',
  source: 'common practice, no source',
  run({ leftMm, rightMm }) {
    const isSame = leftMm.length > 2 && leftMm.length === rightMm.length && leftMm.every((girth, level) => girth !== null && girth === rightMm[level]);
    return isSame ? { message: 'Left and right are the same at every level. Measure one arm again, or keep them and say why.' } : null;
  },
  examplePass: { leftMm: [160, 190, 234], rightMm: [161, 190, 234] },
  exampleFires: { leftMm: [160, 190, 234], rightMm: [160, 190, 234] },
});

export const armsLevels = defineEditCheck<BothArms & { readonly levels: number }>({
  id: 'arms.levels',
  version: 1,
  severity: 'hard',
  uses: 'this-sitting',
  title: 'Same levels on both arms as in the map',
  source: 'Volumes compare only for the same length of arm',
  run({ leftMm, rightMm, levels }) {
    const count = (girths: readonly (number | null)[]): number => girths.filter((girth) => girth !== null).length;
    const [left, right] = [count(leftMm), count(rightMm)];
    if (left === levels && right === levels) return null;
    return { message: `Left has ${left} and right ${right} of ${levels} levels. Measure the missing ones, or leave the form unfinished; no volume is computed until then.` };
  },
  examplePass: { leftMm: [160, 190], rightMm: [161, 191], levels: 2 },
  exampleFires: { leftMm: [160, 190], rightMm: [161, null], levels: 2 },
});
