import { expect, it } from 'vitest';
import { jobs } from '@/lib/jobs';

it('jobs are registered once each, in alphabetical order, as noun.verb', () => {
  const names = jobs.map(({ name }) => name);
  expect(names).toEqual([...new Set(names)].sort());
  for (const name of names) expect(name).toMatch(/^[a-z-]+\.[a-z-]+$/);
});

it('every job is tried again a stated number of times and starts by the clock only with five fields', () => {
  for (const { retry, cron } of jobs) {
    expect(retry.limit).toBeGreaterThanOrEqual(0);
    expect(retry.limit).toBeLessThanOrEqual(20);
    if (cron) expect(cron.trim().split(/\s+/)).toHaveLength(5);
  }
});
