/**
 * Puts jstat behind stats/distributions and runs the statistics tests, to show
 * that they notice. Left out are the ends and inverses of distributions, which
 * ask for quantiles of counts that jstat has not. Prints failing tests a file; ends with an error when
 * nothing failed. Usage: node scripts/mutate-stats.mjs
 */
import { fileURLToPath } from 'node:url';
import { startVitest } from 'vitest/node';

const root = fileURLToPath(new URL('..', import.meta.url));
const weak = `${root}tests/unit/stats/with-jstat.ts`;

const swap = {
  name: 'weak-distributions',
  enforce: 'pre',
  resolveId(source, importer) {
    const fromTests = importer?.endsWith('with-jstat.ts');
    return !fromTests && /(^|\/)distributions$/.test(source) ? weak : null;
  },
};

const vitest = await startVitest(
  'test',
  [],
  { root, config: false, watch: false, include: ['tests/unit/stats/**/*.test.ts'], exclude: ['**/mutation.test.ts', '**/distribution-edges.test.ts'], reporters: [{}], testTimeout: 120_000 },
  { plugins: [swap], resolve: { alias: { '@': root.replace(/\/$/, '') } } },
);

let failed = 0;
for (const file of vitest.state.getTestModules()) {
  const tests = [...file.children.allTests()];
  const bad = tests.filter((test) => test.result().state === 'failed').length;
  const broken = file.errors().length > 0;
  failed += bad + (broken ? 1 : 0);
  console.log(`${file.moduleId.slice(root.length)}: ${broken ? 'cannot run' : `${bad} of ${tests.length} fail`}`);
}
await vitest.close();
console.log(`${failed} tests caught the weak library.`);
process.exitCode = failed > 0 ? 0 : 1;
