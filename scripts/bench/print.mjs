import { cpus, loadavg } from 'node:os';

const ms = (value) => (value >= 100 ? value.toFixed(0) : value.toFixed(1));
const times = (value) => `${value >= 100 ? value.toFixed(0) : value.toFixed(1)}x`;
const count = (value) => value.toLocaleString('en-GB');
const kb = (bytes) => (bytes / 1024).toFixed(0);

/** Columns as wide as their widest cell; the first `words` columns are words, the others figures. */
function table(head, rows, words) {
  const widths = head.map((title, column) => Math.max(title.length, ...rows.map((row) => row[column].length)));
  const line = (cells) => cells.map((cell, column) => (column < words ? cell.padEnd(widths[column]) : cell.padStart(widths[column]))).join('  ').trimEnd();
  return [line(head), widths.map((width) => '-'.repeat(width)).join('  '), ...rows.map(line)].join('\n');
}

/** Each question's figures at every size, and how far they grow from the smallest to the largest. */
function printRatios(figures, tell) {
  const rows = figures.map(({ what, detail, floor, participants, oursMs, floorMs, ratio, pairs }) => [detail ? `${what} (${detail})` : what, floor, count(participants), ms(oursMs), ms(floorMs), times(ratio), String(pairs)]);
  tell('\nOurs against a floor of the same run (medians of paired runs)\n');
  tell(table(['what', 'floor', 'participants', 'ours ms', 'floor ms', 'ours/floor', 'pairs'], rows, 2));
  const sizes = [...new Set(figures.map(({ participants }) => participants))].sort((a, b) => a - b);
  if (sizes.length < 2) return;
  const [small, large] = [sizes[0], sizes.at(-1)];
  const grown = figures
    .filter(({ participants }) => participants === large)
    .flatMap((big) => {
      const first = figures.find(({ what, floor, participants }) => what === big.what && floor === big.floor && participants === small);
      return first ? [[big.what, big.floor, times(big.oursMs / first.oursMs), times(big.floorMs / first.floorMs)]] : [];
    });
  tell(`\nGrowth from ${count(small)} to ${count(large)} participants (${times(large / small)} as many)\n`);
  tell(table(['what', 'floor', 'ours', 'floor grows'], grown, 2));
}

function printPages(pages, tell) {
  tell('\nJavaScript of each page, first load with nothing cached\n');
  tell(table(['page', 'signed in as', 'files', 'gzip kB', 'raw kB'], pages.map(({ path, role, files, transferBytes, rawBytes }) => [path, role, String(files), kb(transferBytes), kb(rawBytes)]), 2));
}

/** One line for what has just been measured: a long run shows that it goes on. */
export function progressLine(one) {
  if (one.kind === 'ratio') return `  ${one.what}, ${count(one.participants)} participants: ${ms(one.oursMs)} ms, ${times(one.ratio)}`;
  return one.kind === 'page' ? `  ${one.path}: ${kb(one.transferBytes)} kB` : `  ${one.what}: not measured`;
}

/** Prints everything that was measured, and by name what was not. */
export function printFigures(told, tell) {
  const of = (kind) => told.filter((one) => one.kind === kind);
  const [ratios, pages, notRun] = [of('ratio'), of('page'), of('not run')];
  tell(`\nNode ${process.versions.node}, ${cpus().length} cores, load average ${loadavg().map((load) => load.toFixed(1)).join(' ')}`);
  if (ratios.length > 0) printRatios(ratios, tell);
  if (pages.length > 0) printPages(pages, tell);
  if (notRun.length === 0) return;
  tell('\nNot measured\n');
  for (const { part, participants, what, why } of notRun) tell(`  ${part} at ${count(participants)}: ${what}: ${why}`);
}
