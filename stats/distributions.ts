/**
 * The one door to distributions. Every estimator imports from here, so that a
 * test can put another library behind this file and show that the suite
 * notices (tests/unit/stats/README.md).
 */
export { betaDist } from './distribution/beta';
export { binomial } from './distribution/binomial';
export { chiSquare } from './distribution/chi-square';
export { fisherF } from './distribution/fisher-f';
export { gammaDist } from './distribution/gamma';
export { hypergeometric } from './distribution/hypergeometric';
export { noncentralT } from './distribution/noncentral-t';
export { normal } from './distribution/normal';
export { poisson } from './distribution/poisson';
export { studentT } from './distribution/student-t';
export type { Continuous, Discrete, Distribution } from './distribution/shape';
