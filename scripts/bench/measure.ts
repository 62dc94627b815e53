/**
 * Measures a served, seeded application; started by scripts/bench.mjs, which tells the address and prints what comes back.
 */
import { parseArgs } from 'node:util';
import { getOrm } from '@/lib/work/orm';
import { benchExtract } from './extract';
import { parts, type Bench, type Part } from './figures';
import { benchLists, benchToday } from './lists';
import { benchPageScripts } from './pages';
import { benchSave } from './save';

const benches: Record<Part, (bench: Bench) => Promise<void>> = {
  save: benchSave,
  list: benchLists,
  today: benchToday,
  extract: benchExtract,
  pages: benchPageScripts,
};

const { values } = parseArgs({ options: { url: { type: 'string' }, participants: { type: 'string' }, pairs: { type: 'string' }, parts: { type: 'string' } } });
const asked = (values.parts ?? '').split(',');
const bench: Bench = {
  url: values.url ?? '',
  participants: Number(values.participants),
  pairs: Number(values.pairs),
  tell: (told) => void process.send?.(told),
};

for (const part of parts.filter((each) => asked.includes(each))) {
  try {
    await benches[part](bench);
  } catch (error) {
    // One part that fails must not lose the others' figures; it is told as not run and the bench ends with 1.
    console.error(error);
    bench.tell({ kind: 'not run', part, participants: bench.participants, what: part, why: `it failed: ${error instanceof Error ? error.message : String(error)}` });
    process.exitCode = 1;
  }
}
await (await getOrm()).close();
process.disconnect?.();
