import { existsSync } from 'node:fs';
import { basename, join } from 'node:path';
import { expect, test } from 'vitest';
import { projectRoot, sourceFiles } from '../support/source-files.ts';

const core = sourceFiles('shared-core');
const all = [...core, ...sourceFiles('electron'), ...sourceFiles('renderer'), ...sourceFiles('test')];

test.each(all)('$path has a kebab-case name', ({ path }) => {
  expect(basename(path)).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9]+(-[a-z0-9]+)*)*\.tsx?$/);
});

const unportable =
  /\bMath\.(exp|expm1|log|log10|log1p|log2|pow|sin|cos|tan|a?sinh?|a?cosh?|a?tanh?|atan2|cbrt|hypot|random)\b/;

test.each(core)('$path computes the same digits on every machine', ({ path, text }) => {
  const code = text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/\/\/.*$/gm, '');
  // A test of the text beside the lint rule: it also sees what a lint comment would hide.
  expect(unportable.exec(code)?.[0], path).toBeUndefined();
  expect(/[\w)\]]\s*\*\*=?\s*[\w(]/.exec(code)?.[0], path).toBeUndefined();
});

test('the search for unportable functions finds them', () => {
  for (const name of ['Math.exp', 'Math.pow', 'Math.atan2', 'Math.tanh', 'Math.asin', 'Math.random']) {
    expect(unportable.test(`const a = ${name}(1);`), name).toBe(true);
  }
  for (const name of ['Math.sqrt', 'Math.abs', 'Math.max']) expect(unportable.test(name), name).toBe(false);
});

/** Exported functions with the comment before them. */
function exportedFunctions(text: string): { name: string; comment: string }[] {
  const pattern =
    /(\/\*\*(?:(?!\*\/)[\s\S])*\*\/)?\s*\nexport (?:function (\w+)|const (\w+)[^=\n]*=\s*(?:<[^>]*>)?\()/g;
  return [...`\n${text}`.matchAll(pattern)].map(([, comment = '', named, arrow]) => ({
    name: named ?? arrow ?? '',
    comment,
  }));
}

const numeric = core.filter(({ path }) => /^shared-core\/(numeric|physics)\//.test(path));

test.each(numeric)(
  '$path says what each function gives, and where its formulas come from or are checked',
  (file) => {
    const functions = exportedFunctions(file.text);
    expect(functions.filter(({ comment }) => comment === '').map(({ name }) => name)).toEqual([]);
    if (functions.length > 0) expect(file.text).toMatch(/@source|@check/);
  },
);

test.each(core)('$path names only checks that exist', ({ text }) => {
  const named = [...text.matchAll(/@check\s+(test\/[\w./-]+)/g)].map((match) => match[1] ?? '');
  expect(named.filter((path) => !existsSync(join(projectRoot, path)))).toEqual([]);
});

test('no source is left half done', () => {
  const marks = new RegExp(['TO', 'DO|FIX', 'ME|it\\.', 'skip\\('].join(''));
  expect(all.filter(({ text }) => marks.test(text)).map(({ path }) => path)).toEqual([]);
});
