import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { projectRoot, sourceFiles } from '../support/source-files.ts';

const table = readFileSync(join(projectRoot, 'REFERENCES.md'), 'utf8');
const rows = table
  .split('\n')
  .filter((line) => line.startsWith('|') && !line.startsWith('| key') && !line.startsWith('| --'))
  .map((line) =>
    line
      .split('|')
      .slice(1, -1)
      .map((cell) => cell.trim()),
  );
const listed = rows.map(([key]) => key!);
const keyPattern = /\[([A-Za-z]+\d{3,4}[a-z]?)\]/g;

interface Docstring {
  readonly path: string;
  readonly text: string;
}

/** Every docstring of shared-core that stands before a function. */
const docstrings: readonly Docstring[] = sourceFiles('shared-core').flatMap(({ path, text }) =>
  [...text.matchAll(/\/\*\*((?:(?!\*\/)[\s\S])*)\*\/\s*export (?:const|function\*?)/g)].map((match) => ({
    path,
    text: match[1]!,
  })),
);
const sourcesOf = (text: string): string => /@source([\s\S]*?)(?=\n\s*\* @|$)/.exec(text)?.[1] ?? '';
/** Folders whose exported functions compute numbers that somebody relies on. */
const numericFolders =
  /shared-core\/(numeric|physics|noise|axis|lines|populations|optical-depth|uncertainty|identify|simulation)\//;

describe('REFERENCES.md', () => {
  test('has a reference and says how it was verified, for every key, each once and in order', () => {
    expect(rows.length).toBeGreaterThan(40);
    for (const row of rows) {
      expect(row).toHaveLength(3);
      for (const cell of row) expect(cell).not.toBe('');
    }
    expect(new Set(listed).size).toBe(listed.length);
    expect(listed).toEqual([...listed].sort((a, b) => a.toLowerCase().localeCompare(b.toLowerCase(), 'en')));
  });

  test('every key is used by a docstring, and every key used is listed', () => {
    const used = new Set(
      sourceFiles('shared-core').flatMap(({ text }) =>
        [...text.matchAll(/\/\*\*[\s\S]*?\*\//g)].flatMap(([comment]) =>
          [...comment.matchAll(keyPattern)].map(([, key]) => key!),
        ),
      ),
    );
    expect([...used].filter((key) => !listed.includes(key)).sort()).toEqual([]);
    expect(listed.filter((key) => !used.has(key))).toEqual([]);
  });
});

describe('docstrings of numeric functions', () => {
  const numeric = docstrings.filter(
    ({ path, text }) => numericFolders.test(path) && text.includes('@source'),
  );

  test('a source names a key, another function of the program, or says that it is common practice or our own', () => {
    const unclear = numeric
      .filter(({ text }) => {
        const source = sourcesOf(text);
        const isNamed = source.match(keyPattern) !== null;
        const isWithin = /[a-z]+[A-Z]\w+|\w+\.ts|[a-z]+Q|caseB/.test(source);
        return !isNamed && !isWithin && !/common practice|own|definition/i.test(source);
      })
      .map(({ path, text }) => `${path}: ${sourcesOf(text).trim()}`);
    expect(unclear).toEqual([]);
  });

  test('every one with a source names the test that checks it', () => {
    expect(numeric.length).toBeGreaterThan(80);
    expect(numeric.filter(({ text }) => !text.includes('@check')).map(({ path }) => path)).toEqual([]);
  });
});
