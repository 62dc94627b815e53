import { cumulativeIncidence, incidenceAt } from '@/stats/survival/cumulative-incidence';
import { grayTest } from '@/stats/survival/gray';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { survivalAt } from '@/stats/survival/survival-at';
import { columnOf, entryOf, levelOf, levelsOf, tableOf, timesOf } from './follow-up-columns';
import { runTopic, type ReferenceCase, type Table } from './reference';

function competingOf(table: Table) {
  return { time: timesOf(table), cause: Uint8Array.from(table.numbers('cause')) };
}

function incidence(reference: ReferenceCase) {
  const cause = Number(/cause(\d+)/.exec(reference.id)?.[1] ?? 1);
  const { time } = reference.expected as { time: number[] };
  const table = tableOf(reference);
  const data = { ...competingOf(table), ...entryOf(table) };
  const greenwood = cumulativeIncidence(data, { level: levelOf(reference) });
  const aalen = cumulativeIncidence(data, { variance: 'aalen' });
  const at = time.map((t) => incidenceAt(greenwood, cause, t));
  return {
    time,
    cuminc: at.map(({ estimate }) => estimate),
    var_greenwood: at.map(({ se }) => se! ** 2),
    se_greenwood: at.map(({ se }) => se),
    loglog_lower: at.map(({ lower }) => lower),
    loglog_upper: at.map(({ upper }) => upper),
    var_aalen_cmprsk: time.map((t) => incidenceAt(aalen, cause, t).se! ** 2),
  };
}

/** Melanoma thickness in three groups, as the case words it: up to 2, over 2 to 5, over 5 mm. */
function groupOf(reference: ReferenceCase, table: Table): Int32Array {
  if (reference.id.includes('3groups')) return Int32Array.from(table.numbers('thickness'), (mm) => (mm <= 2 ? 0 : mm <= 5 ? 1 : 2));
  return levelsOf(table.text(columnOf(reference, 'group', [[/abo/, 'abo'], [/melanoma/, 'ulcer'], [/./, 'group']])!)).codes;
}

function gray(reference: ReferenceCase) {
  const table = tableOf(reference);
  const stratum = columnOf(reference, 'strata', [[/strata/, 'sex']]);
  const data = { ...competingOf(table), group: groupOf(reference, table), ...(stratum && { stratum: levelsOf(table.text(stratum)).codes }) };
  return Object.fromEntries(
    Object.keys(reference.expected as object).map((name) => {
      const { chiSquare, df, p } = grayTest(data, { cause: Number(name.replace('cause', '')) });
      return [name, { chisq: chiSquare, df, p }];
    }),
  );
}

function identity(reference: ReferenceCase) {
  const { time } = reference.expected as { time: number[] };
  const data = competingOf(tableOf(reference));
  const curves = cumulativeIncidence(data);
  const naive = kaplanMeier({ time: data.time, event: data.cause.map((code) => (code === 1 ? 1 : 0)) });
  return {
    time,
    all_cause_survival: time.map((t) => 1 - curves.causes.reduce((sum, { cause }) => sum + incidenceAt(curves, cause, t).estimate!, 0)),
    one_minus_km_cause1: time.map((t) => 1 - survivalAt(naive, t).estimate!),
  };
}

runTopic('04-competing-risks', { 'cif-melanoma': incidence, 'cif-transplant': incidence, 'gray-': gray, 'cif-sum-identity': identity });
