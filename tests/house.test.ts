import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { describe, expect, test } from 'vitest';

/** The house's rules that a compiler does not know. DEVELOPERS.md says them in words. */
const root = resolve(__dirname, '..');
const rooms = ['app', 'components', 'entities', 'instruments', 'lib', 'migrations', 'scripts', 'stats'] as const;

const walk = (folder: string): string[] =>
  readdirSync(join(root, folder)).flatMap((name) => {
    const path = join(folder, name);
    return statSync(join(root, path)).isDirectory() ? walk(path) : [path];
  });

interface Source {
  readonly path: string;
  readonly text: string;
  readonly imports: readonly { readonly from: string; readonly typeOnly: boolean }[];
}

/** Import statements with what they point at, as a path from the root (or a package's name). */
function importsOf(path: string, text: string): Source['imports'] {
  const found = [...text.matchAll(/(?:^|\n)\s*(import|export)\s+(type\s+)?(?:[^'";]*?\sfrom\s+)?['"]([^'"]+)['"]/g)].map(([, , type, from]) => ({
    from: from as string,
    typeOnly: type !== undefined,
  }));
  const lazy = [...text.matchAll(/\bimport\(\s*['"]([^'"]+)['"]\s*\)/g)].map(([, from]) => ({ from: from as string, typeOnly: false }));
  return [...found, ...lazy].map(({ from, typeOnly }) => {
    if (from.startsWith('@/')) return { from: from.slice(2), typeOnly };
    if (from.startsWith('.')) return { from: relative(root, resolve(root, dirname(path), from)), typeOnly };
    return { from: `npm:${from}`, typeOnly };
  });
}

const sources: Source[] = rooms
  .flatMap(walk)
  .filter((path) => /\.(ts|tsx|mjs)$/.test(path))
  .map((path) => {
    const text = readFileSync(join(root, path), 'utf8');
    return { path, text, imports: importsOf(path, text) };
  });

const roomOf = (path: string): string => path.split('/')[0] ?? '';
const inRoom = (room: string) => sources.filter(({ path }) => roomOf(path) === room);
const code = (text: string) => text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/(^|[^:])\/\/.*$/gm, '$1');

/** What a file may import, by room. */
const arrows: Record<string, (from: string, typeOnly: boolean, path: string) => boolean> = {
  stats: () => false,
  instruments: (from) => from.startsWith('stats/'),
  entities: (from) => from.startsWith('instruments/'),
  lib: (from) => /^(stats|instruments|entities)(\/|$)/.test(from) || from === 'mikro-orm.config',
  // A form shares the API's own input schema; anything else of lib is a type.
  components: (from, typeOnly) => from.startsWith('instruments/') || (from.startsWith('stats/') && typeOnly) || (from.startsWith('lib/') && (typeOnly || /(^|\/)[\w-]*input$/.test(from))),
  app: (from) => /^(instruments|lib|components|fonts)(\/|$)/.test(from),
  migrations: () => false,
  scripts: (from) => /^(stats|instruments|entities|lib|migrations|mikro-orm\.config|tests\/reference)/.test(from),
};

/** Ground floor, then capabilities: each may import those before it, never after. */
const floors = [
  ['env', 'log', 'work', 'auth', 'audit', 'mail', 'storage', 'jobs', 'web'],
  ['protocol'],
  ['people'],
  ['consent'],
  ['schedule'],
  ['enrolment'],
  ['queries'],
  ['measurement'],
  ['questionnaires'],
  ['training'],
  ['safety'],
  ['participants'],
  ['review'],
  ['summary'],
  ['results'],
  ['extracts'],
  ['today'],
];
const floorOf = (path: string): number => floors.findIndex((names) => names.includes((path.split('/')[1] ?? '').replace(/\.ts$/, '')));

describe('the house', () => {
  test.each(Object.keys(arrows))('%s imports only what its arrows allow', (room) => {
    const trespasses = inRoom(room).flatMap(({ path, imports }) =>
      imports
        .filter(({ from }) => !from.startsWith('npm:') && roomOf(from) !== room && !arrows[room]?.(from, false, path))
        .filter(({ from, typeOnly }) => !(typeOnly && arrows[room]?.(from, true, path)))
        .map(({ from }) => `${path} → ${from}`),
    );
    expect(trespasses).toEqual([]);
  });

  test('capabilities of lib import downwards only', () => {
    const climbing = inRoom('lib').flatMap(({ path, imports }) =>
      imports
        .filter(({ from }) => roomOf(from) === 'lib' && floorOf(from) > floorOf(path))
        // A job's handler is the one place where the ground floor reaches up: the registry lists it.
        .filter(() => !path.startsWith('lib/jobs/handlers/'))
        .map(({ from }) => `${path} → ${from}`),
    );
    expect(climbing).toEqual([]);
  });

  test('every capability has its floor', () => {
    const names = [...new Set(inRoom('lib').map(({ path }) => (path.split('/')[1] ?? '').replace(/\.ts$/, '')))];
    expect(names.filter((name) => !floors.flat().includes(name))).toEqual([]);
  });

  test('React stays in components and app', () => {
    const strays = sources
      .filter(({ path }) => !/^(app|components)\//.test(path) && !path.startsWith('lib/web/'))
      .filter(({ imports }) => imports.some(({ from }) => /^npm:(react|react-dom)(\/|$)/.test(from)));
    expect(strays.map(({ path }) => path)).toEqual([]);
  });

  test('next stays in app, components and lib/web', () => {
    const strays = sources
      .filter(({ path }) => !/^(app|components)\//.test(path) && !/^lib\/web\//.test(path))
      .filter(({ imports }) => imports.some(({ from }) => /^npm:next(\/|$)/.test(from)));
    expect(strays.map(({ path }) => path)).toEqual([]);
  });

  const forbidden: [string, RegExp, (path: string) => boolean][] = [
    ['the clock is read in lib/work only', /new Date\(|Date\.now\(/, (path) => /^(lib|entities)\//.test(path) && !path.startsWith('lib/work/')],
    ['chance is seeded', /Math\.random/, (path) => /^(stats|instruments)\//.test(path)],
    ['the surroundings are read in lib/env only', /process\.env/, (path) => /^(lib|app|components|entities|instruments|stats)\//.test(path) && path !== 'lib/env.ts'],
    ['transactions are opened in lib/work only', /\.transactional\(|em\.begin\(/, (path) => /^(lib|app)\//.test(path) && !path.startsWith('lib/work/')],
    ['nothing is any', /:\s*any\b|\bas any\b|<any>/, () => true],
    ['no rule is switched off', /eslint-disable|@ts-ignore|@ts-nocheck|@ts-expect-error/, (path) => !path.startsWith('scripts/')],
  ];
  test.each(forbidden)('%s', (_rule, pattern, where) => {
    expect(sources.filter(({ path, text }) => where(path) && pattern.test(code(text))).map(({ path }) => path)).toEqual([]);
  });

  test('files stay short enough to read', () => {
    const long = sources
      // A registry is a list, not code to be read through.
      .filter(({ path }) => !path.startsWith('scripts/') && path !== 'stats/registry.ts')
      .map(({ path, text }) => ({ path, lines: text.split('\n').length }))
      .filter(({ lines }) => lines > 350);
    expect(long).toEqual([]);
  });

  test('every address of the API is in the route table', () => {
    const table = readFileSync(join(root, 'app/api/routes.ts'), 'utf8');
    const made = inRoom('app').filter(({ path, text }) => path.endsWith('/route.ts') && /\b(?:route|uploadRoute|plainRoute)\(\{/.test(text));
    const missing = made
      .map(({ path }) => path.replace(/^app/, '').replace(/\/route\.ts$/, '').replace(/\[(\w+)\]/g, '{$1}'))
      .filter((address) => !table.includes(`'${address}'`));
    expect(missing).toEqual([]);
  });

  test('a handler stays thin', () => {
    const fat = inRoom('app')
      .filter(({ path }) => path.endsWith('/route.ts'))
      .filter(({ text }) => text.split('\n').filter((line) => line.trim() !== '' && !/^import|^\} from/.test(line)).length > 40);
    expect(fat.map(({ path }) => path)).toEqual([]);
  });

  test('pages hold no SQL', () => {
    expect(inRoom('app').filter(({ text }) => /\.sql\(|\bselect .+ from\b/i.test(code(text))).map(({ path }) => path)).toEqual([]);
  });

  test('every path DEVELOPERS.md names exists', () => {
    const text = readFileSync(join(root, 'DEVELOPERS.md'), 'utf8');
    const named = [...text.matchAll(/`([\w./()[\]-]+\/[\w./()[\]-]*)`/g)].map(([, path]) => path as string).filter((path) => rooms.some((room) => path.startsWith(`${room}/`)) || path.startsWith('tests/'));
    expect(named.length).toBeGreaterThan(10);
    expect(named.filter((path) => !existsSync(join(root, path)))).toEqual([]);
  });
});
