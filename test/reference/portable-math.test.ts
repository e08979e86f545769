import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { atan, cos, erf, erfc, exp, log, log10, pow, sin } from '../../shared-core/numeric/portable-math.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { projectRoot } from '../support/source-files.ts';
import { ulpsBetween } from '../support/ulps.ts';

type Name = 'exp' | 'log' | 'log10' | 'pow' | 'sin' | 'cos' | 'atan' | 'erf' | 'erfc';
const cases = JSON.parse(
  readFileSync(join(projectRoot, 'test/data/elementary-functions.json'), 'utf8'),
) as Record<Name, readonly (readonly number[])[]>;

const worst = (values: readonly number[]): number => values.reduce((a, b) => Math.max(a, b), 0);

describe('against values of 50 digits and more', () => {
  test.each([
    ['exp', exp, 1],
    ['log', log, 1],
    ['log10', log10, 2],
    ['sin', sin, 1],
    ['cos', cos, 1],
    ['atan', atan, 1],
    ['erf', erf, 1],
    ['erfc', erfc, 2],
  ] as const)('%s', (name, function_, allowed) => {
    expect(cases[name].length).toBeGreaterThan(400);
    expect(worst(cases[name].map(([x, value]) => ulpsBetween(function_(x!), value!)))).toBeLessThanOrEqual(
      allowed,
    );
  });

  test('pow, results from the smallest to the largest', () => {
    expect(cases.pow.length).toBeGreaterThan(500);
    expect(worst(cases.pow.map(([x, y, value]) => ulpsBetween(pow(x!, y!), value!)))).toBeLessThanOrEqual(2);
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

  test('log10 and pow', () => {
    const wide = places.map((u) => Math.exp(1400 * u - 700));
    expect(worst(wide.map((x) => ulpsBetween(log10(x), Math.log10(x))))).toBeLessThanOrEqual(2);
    const powers = places.map((u, i) => {
      const [x, y] = [Math.exp(40 * u - 20), 8 * places.at(i - 1)! - 4];
      return ulpsBetween(pow(x, y), Math.pow(x, y));
    });
    expect(worst(powers)).toBeLessThanOrEqual(2);
  });

  test.each([
    ['sin', sin, Math.sin],
    ['cos', cos, Math.cos],
    ['atan', atan, Math.atan],
  ] as const)('%s', (_name, own, engine) => {
    const ulps = places.map((u) => ulpsBetween(own(40 * u - 20), engine(40 * u - 20)));
    expect(worst(ulps)).toBeLessThanOrEqual(2);
  });
});

test('the logarithm of a power of ten is a whole number', () => {
  for (let n = -22; n <= 22; n++) expect(log10(Number(`1e${String(n)}`))).toBe(n);
});

test('erf and erfc are complements, odd and mirrored', () => {
  for (let x = -6; x <= 6; x += 0.037) {
    expect(erf(-x)).toBe(-erf(x));
    expect(Math.abs(erf(x) + erfc(x) - 1)).toBeLessThan(3e-16);
    expect(Math.abs(erfc(-x) + erfc(x) - 2)).toBeLessThan(5e-16);
  }
});

test("pow has Math.pow's special cases", () => {
  const bases = [0, -0, 1, -1, 2, -2, 0.5, -0.5, Infinity, -Infinity, NaN, 1e300, 5e-324];
  const small = [0, -0, 1, -1, 2, 3, -3, 0.5, -0.5, 1e-320];
  const exponents = [...small, Infinity, -Infinity, NaN, 1e300, -1e300, 1e20];
  for (const x of bases) {
    for (const y of exponents) {
      const [own, engine] = [pow(x, y), Math.pow(x, y)];
      const isSame = Object.is(own, engine) || ulpsBetween(own, engine) === 1;
      expect(isSame, `${String(x)}^${String(y)}: ${String(own)}, ${String(engine)}`).toBe(true);
    }
  }
});

test('an angle is reduced exactly however large it is', () => {
  // Of all doubles the one nearest to a multiple of pi/2: 6381956970095103 2^797; among the 400-digit values too.
  const [, expected] = cases.cos.find(([x]) => x === 6381956970095103 * 2 ** 797)!;
  expect(cos(6381956970095103 * 2 ** 797)).toBe(expected);
  expect(Math.abs(expected!)).toBeLessThan(5e-19);
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
    [pow(-2, 2), 4],
    [pow(-2, 0.5), NaN],
    [pow(2, 1024), Infinity],
    [pow(2, -1075), 0],
    [pow(2, -1074), 5e-324],
    [sin(0), 0],
    [sin(-0), -0],
    [sin(Infinity), NaN],
    [cos(0), 1],
    [cos(-Infinity), NaN],
    [cos(NaN), NaN],
    [atan(-0), -0],
    [atan(Infinity), Math.PI / 2],
    [atan(-Infinity), -Math.PI / 2],
    [atan(NaN), NaN],
    [erf(-0), -0],
    [erf(Infinity), 1],
    [erf(-Infinity), -1],
    [erf(NaN), NaN],
    [erfc(0), 1],
    [erfc(Infinity), 0],
    [erfc(-Infinity), 2],
    [erfc(30), 0],
    [erfc(NaN), NaN],
  ])('case %# gives %d', (actual, expected) => {
    expect(actual).toBe(expected);
  });

  test('the smallest results are subnormal, not zero', () => {
    expect(ulpsBetween(exp(-745.1), Math.exp(-745.1))).toBeLessThanOrEqual(1);
    expect(exp(-745.1)).toBe(5e-324);
  });
});
