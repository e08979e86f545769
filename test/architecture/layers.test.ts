import { describe, expect, test } from 'vitest';
import { importsOf, sourceFiles } from '../support/source-files.ts';

/** Stages of shared-core: a folder imports only folders of a lower rank. A folder without a rank fails. */
const coreRank: Readonly<Record<string, number>> = {
  result: 0,
  schema: 0,
  text: 1,
  numeric: 1,
  physics: 2,
  uncertainty: 2,
  bench: 3,
  safety: 4,
  recording: 4,
  noise: 5,
  axis: 6,
  instrument: 6.5,
  lines: 7,
  populations: 8,
  'optical-depth': 8,
  identify: 8,
  simulation: 8,
  diagnosis: 9,
  report: 10,
  pipeline: 11,
  saved: 12,
  contract: 12,
};

/** What each folder outside shared-core may import, besides itself and packages. */
const outside: Readonly<Record<string, readonly string[]>> = {
  'electron/services': ['shared-core'],
  'electron/desktop': ['shared-core', 'electron/services'],
  'electron/desktop/preload': ['shared-core/contract/bridge.ts'],
  'electron/loopback': ['shared-core', 'electron/services'],
  'electron/command-line': ['shared-core', 'electron/services'],
  renderer: ['shared-core'],
};

const core = sourceFiles('shared-core');
const others = [...sourceFiles('electron'), ...sourceFiles('renderer')];

const coreFolder = (path: string): string => path.split('/')[1] ?? '';

/** The most specific folder of `outside` that holds the file. */
const folderOf = (path: string): string | undefined =>
  Object.keys(outside)
    .filter((folder) => path.startsWith(`${folder}/`))
    .sort((a, b) => b.length - a.length)[0];

/** What is wrong with a file of shared-core; empty when nothing is. */
function coreFaults(path: string, imports: readonly string[]): string[] {
  const own = coreRank[coreFolder(path)];
  if (own === undefined) return [`${path}: its folder has no rank`];
  return imports
    .filter((target) => target.includes('/') && !target.startsWith('node:'))
    .flatMap((target) => {
      if (!target.startsWith('shared-core/')) return [`${path} leaves shared-core for ${target}`];
      if (coreFolder(target) === coreFolder(path)) return [];
      const rank = coreRank[coreFolder(target)];
      return rank !== undefined && rank < own ? [] : [`${path} imports upwards, ${target}`];
    });
}

function outsideFaults(path: string, imports: readonly string[]): string[] {
  const folder = folderOf(path);
  if (folder === undefined) return [`${path}: its folder has no rule`];
  const allowed = [folder, ...(outside[folder] ?? [])];
  return imports
    .filter((target) => /^(shared-core|electron|renderer|test|assets)\//.test(target))
    .filter((target) => !allowed.some((prefix) => target === prefix || target.startsWith(`${prefix}/`)))
    .map((target) => `${path} may not import ${target}`);
}

test('shared-core is there to be looked at', () => {
  expect(core.length).toBeGreaterThan(20);
  expect(others.length).toBeGreaterThan(20);
});

test.each(core)('$path imports only downwards', ({ path, imports }) => {
  expect(coreFaults(path, imports)).toEqual([]);
});

test.each(others)('$path keeps to its layer', ({ path, imports }) => {
  expect(outsideFaults(path, imports)).toEqual([]);
});

test('no file takes part in a circle of imports', () => {
  const all = new Map([...core, ...others].map((file) => [file.path, file.imports]));
  const done = new Set<string>();
  const circleFrom = (path: string, trail: readonly string[]): string | null => {
    if (trail.includes(path)) return [...trail.slice(trail.indexOf(path)), path].join(' -> ');
    if (done.has(path)) return null;
    for (const target of all.get(path) ?? []) {
      const circle = circleFrom(target, [...trail, path]);
      if (circle !== null) return circle;
    }
    done.add(path);
    return null;
  };
  expect([...all.keys()].map((path) => circleFrom(path, [])).filter((circle) => circle !== null)).toEqual([]);
});

describe('packages', () => {
  const packagesOf = (file: { imports: readonly string[] }): string[] =>
    file.imports.filter((name) => !/^(shared-core|electron|renderer|test|assets)\//.test(name));

  test('shared-core needs zod for its schemas, papaparse for tables, and nothing else', () => {
    const found = core.flatMap((file) => packagesOf(file).map((name) => [file.path, name] as const));
    expect(found.filter(([, name]) => name !== 'zod' && name !== 'papaparse')).toEqual([]);
    expect(found.filter(([, name]) => name === 'zod').map(([path]) => path)).toEqual([
      'shared-core/schema/zod.ts',
    ]);
  });

  test('schemas are written only where data come in or go out', () => {
    const users = core.filter((file) => file.imports.includes('shared-core/schema/zod.ts'));
    const folders = [...new Set(users.map((file) => coreFolder(file.path)))].sort();
    expect(folders).toEqual(['bench', 'contract', 'diagnosis', 'saved']);
  });

  test('electron is imported in electron/desktop alone', () => {
    const users = others.filter((file) => file.imports.includes('electron'));
    expect(users.every((file) => file.path.startsWith('electron/desktop/'))).toBe(true);
    expect(users.length).toBeGreaterThan(3);
  });
});

describe('the rules themselves', () => {
  test.each([
    ['a type import', "import type { A } from '../pipeline/diagnose.ts';"],
    ['a re-export', "export { a } from '../contract/dispatch.ts';"],
    ['an import on several lines', "import {\n  a,\n  b,\n} from '../lines/fit.ts';"],
    ['a dynamic import', "const a = await import('../report/html.ts');"],
    ['a side effect', "import '../axis/register.ts';"],
    ['a way out', "import { a } from '../../electron/services/host.ts';"],
  ])('find %s upwards', (_what, code) => {
    const path = 'shared-core/numeric/invented.ts';
    expect(coreFaults(path, importsOf(path, code))).toHaveLength(1);
  });

  test('find a folder without a rank or rule', () => {
    expect(coreFaults('shared-core/invented/a.ts', [])).toHaveLength(1);
    expect(outsideFaults('electron/invented/a.ts', [])).toHaveLength(1);
  });

  test('find a door that imports a door, and services that import the page', () => {
    expect(outsideFaults('electron/desktop/a.ts', ['electron/loopback/http-host.ts'])).toHaveLength(1);
    expect(outsideFaults('electron/services/a.ts', ['renderer/main.tsx'])).toHaveLength(1);
    expect(outsideFaults('renderer/a.ts', ['electron/services/host.ts'])).toHaveLength(1);
  });
});
