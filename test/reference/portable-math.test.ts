import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { exp, log, log10, pow } from '../../shared-core/numeric/portable-math.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { projectRoot } from '../support/source-files.ts';
import { ulpsBetween } from '../support/ulps.ts';

type Name = 'exp' | 'log' | 'log10' | 'pow';
const cases = JSON.parse(
  readFileSync(join(projectRoot, 'test/data/elementary-functions.json'), 'utf8'),
) as Record<Name, readonly (readonly number[])[]>;

const worst = (values: readonly number[]): number => values.reduce((a, b) => Math.max(a, b), 0);

describe('against 50-digit values', () => {
  test.each([
    ['exp', exp, 1],
    ['log', log, 1],
    ['log10', log10, 2],
  ] as const)('%s', (name, function_, allowed) => {
    expect(cases[name].length).toBeGreaterThan(600);
    expect(worst(cases[name].map(([x, value]) => ulpsBetween(function_(x!), value!)))).toBeLessThanOrEqual(
      allowed,
    );
  });

  test('pow, whose error grows with y ln x', () => {
    for (const [x, y, value] of cases.pow) {
      const relative = Math.abs(pow(x!, y!) / value! - 1);
      expect(relative, `${String(x)}^${String(y)}`).toBeLessThanOrEqual(
        2.3e-16 * (2 + Math.abs(y! * Math.log(x!))),
      );
    }
  });
});

describe("against the engine's own functions, 100 000 places", () => {
  const random = createRandom(7);
  const places = Array.from({ length: 100_000 }, () => random.uniform());

  test('exp over its whole range', () => {
    const near = worst(places.map((u) => ulpsBetween(exp(2 * u - 1), Math.exp(2 * u - 1))));
    const far = worst(places.map((u) => ulpsBetween(exp(1450 * u - 743), Math.exp(1450 * u - 743))));
    expect([near, far].every((ulps) => ulps <= 2)).toBe(true);
  });

  test('log over its whole range', () => {
    const near = worst(places.map((u) => ulpsBetween(log(0.5 + u), Math.log(0.5 + u))));
    const far = worst(
      places.map((u) => ulpsBetween(log(Math.exp(1400 * u - 700)), Math.log(Math.exp(1400 * u - 700)))),
    );
    expect([near, far].every((ulps) => ulps <= 2)).toBe(true);
  });
});

describe('at the ends', () => {
  test.each([
    [exp(0), 1],
    [exp(-0), 1],
    [exp(Infinity), Infinity],
    [exp(-Infinity), 0],
    [exp(NaN), NaN],
    [exp(710), Infinity],
    [exp(-746), 0],
    [log(1), 0],
    [log(0), -Infinity],
    [log(-0), -Infinity],
    [log(-1), NaN],
    [log(Infinity), Infinity],
    [log(NaN), NaN],
    [log10(0), -Infinity],
    [pow(0, 2), 0],
    [pow(0, -2), Infinity],
    [pow(0, 0), 1],
    [pow(5, 0), 1],
    [pow(NaN, 2), NaN],
    [pow(-2, 2), NaN],
  ])('case %# gives %d', (actual, expected) => {
    expect(actual).toBe(expected);
  });

  test('the smallest results are subnormal, not zero', () => {
    expect(ulpsBetween(exp(-745.1), Math.exp(-745.1))).toBeLessThanOrEqual(1);
    expect(exp(-745.1)).toBe(5e-324);
  });
});
