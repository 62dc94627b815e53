import type { Work } from '@/lib/work/work';

/** Runs a service and counts the statements it asked for: raw SQL and finds. */
export async function countStatements<T>(work: Work, run: (counted: Work) => Promise<T>): Promise<{ result: T; statements: number }> {
  let statements = 0;
  const em = new Proxy(work.em, {
    get: (target, name) => {
      const value: unknown = Reflect.get(target, name);
      if (typeof value !== 'function') return value;
      return (...args: unknown[]): unknown => {
        if (name === 'find' || name === 'findOne' || name === 'execute') statements += 1;
        return (value as (...given: unknown[]) => unknown).apply(target, args);
      };
    },
  });
  const counted: Work = {
    ...work,
    em,
    sql: (text, values) => {
      statements += 1;
      return work.sql(text, values);
    },
  };
  const result = await run(counted);
  return { result, statements };
}
