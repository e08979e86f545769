import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { projectRoot } from '../support/source-files.ts';

interface Manifest {
  readonly dependencies?: Readonly<Record<string, string>>;
  readonly devDependencies: Readonly<Record<string, string>>;
}
const manifest = JSON.parse(readFileSync(join(projectRoot, 'package.json'), 'utf8')) as Manifest;
const guide = readFileSync(join(projectRoot, 'DEVELOPERS.md'), 'utf8');

/** Rows of the table of dependencies in DEVELOPERS.md: the name in backticks, then its reason in the last cell. */
const reasons = new Map(
  [...guide.matchAll(/^\|\s*`([^`]+)`\s*\|(.*)\|\s*$/gm)].map(([, name = '', rest = '']) => [
    name,
    rest.split('|').at(-1)?.trim() ?? '',
  ]),
);

const packages = Object.entries({ ...manifest.dependencies, ...manifest.devDependencies });

test.each(packages)('%s has a row with a reason in DEVELOPERS.md', (name) => {
  expect((reasons.get(name) ?? '').length, name).toBeGreaterThan(10);
});

test.each(packages)('%s is pinned to one version', (_name, version) => {
  expect(version).toMatch(/^\d+\.\d+\.\d+$/);
});
