/** One R process for all tasks, asked line by line so that our runs and R's alternate. */
import { spawn, spawnSync } from 'node:child_process';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';

export interface RAnswer {
  readonly seconds: number;
  readonly value: readonly number[];
}

export interface RProcess {
  ask(task: string, data: string): Promise<RAnswer>;
  close(): void;
}

/** Packages R must have; the names are Debian's. */
const PACKAGES: Readonly<Record<string, string>> = { survival: 'r-cran-survival', cmprsk: 'r-cran-cmprsk', lme4: 'r-cran-lme4' };

/** What is missing for the comparison, as Debian packages; empty when all is there. */
export function missingPackages(): string[] {
  const probe = spawnSync('Rscript', ['-e', 'cat(rownames(installed.packages()))'], { encoding: 'utf8' });
  if (probe.error || probe.status !== 0) return ['r-base-core', ...Object.values(PACKAGES)];
  const installed = new Set(probe.stdout.split(/\s+/));
  return Object.keys(PACKAGES).filter((name) => !installed.has(name)).map((name) => PACKAGES[name]!);
}

/** @param folder where the columns are, as task data.COLUMN.f64 */
export function startR(folder: string): RProcess {
  const child = spawn('Rscript', [fileURLToPath(new URL('../bench-stats.R', import.meta.url)), folder], { stdio: ['pipe', 'pipe', 'inherit'] });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  return {
    async ask(task, data) {
      child.stdin.write(`${task}\t${data}\n`);
      const line = await lines.next();
      if (line.done) throw new Error(`R ended while it ran ${task}`);
      const answer = JSON.parse(line.value) as RAnswer & { error?: string };
      if (answer.error !== undefined) throw new Error(`R could not run ${task}: ${answer.error}`);
      return answer;
    },
    close: () => child.stdin.end(),
  };
}
