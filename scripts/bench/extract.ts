import type { Bench } from './figures';

export async function benchExtract({ participants, tell }: Bench): Promise<void> {
  tell({ kind: 'not run', part: 'extract', participants, what: 'extract', why: 'not built yet' });
}
