import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { choleskyFactor, choleskySolve } from '../../../shared-core/numeric/cholesky.ts';
import {
  chiSquareCdf,
  chiSquareQuantile,
  chiSquareUpperTail,
  normalCdf,
  normalQuantile,
  studentTQuantile,
} from '../../../shared-core/numeric/distributions.ts';
import { fitStraightLine } from '../../../shared-core/numeric/fit-straight-line.ts';
import { atan, cos, exp, log, pow, sin } from '../../../shared-core/numeric/portable-math.ts';
import { quantile } from '../../../shared-core/numeric/robust.ts';

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const runs = { numRuns: 2000 };

describe('elementary functions', () => {
  it('logarithm undoes the exponential', () => {
    fc.assert(
      fc.property(between(-700, 700), (x) => {
        expect(Math.abs(log(exp(x)) - x)).toBeLessThanOrEqual(2.3e-16 * (1 + Math.abs(x)));
      }),
      runs,
    );
  });

  it('rise where they should', () => {
    fc.assert(
      fc.property(between(-700, 700), between(1e-9, 1), (x, step) => {
        expect(exp(x + step)).toBeGreaterThanOrEqual(exp(x));
        expect(log(exp(x) * (1 + step))).toBeGreaterThanOrEqual(log(exp(x)));
        expect(atan(x + step)).toBeGreaterThanOrEqual(atan(x));
      }),
      runs,
    );
  });

  it('powers of one base multiply, and a root undoes a power', () => {
    fc.assert(
      fc.property(between(1e-3, 1e3), between(-5, 5), between(-5, 5), (x, a, b) => {
        expect(Math.abs((pow(x, a) * pow(x, b)) / pow(x, a + b) - 1)).toBeLessThan(1e-14);
        fc.pre(Math.abs(a) > 0.01);
        expect(Math.abs(pow(pow(x, a), 1 / a) / x - 1)).toBeLessThan(1e-14 / Math.min(1, Math.abs(a)));
      }),
      runs,
    );
  });

  it('square of sine and of cosine make one, however large the angle', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
        expect(Math.abs(sin(x) * sin(x) + cos(x) * cos(x) - 1)).toBeLessThan(5e-16);
        expect(sin(-x)).toBe(-sin(x));
        expect(cos(-x)).toBe(cos(x));
      }),
      runs,
    );
  });
});

describe('distributions', () => {
  it('quantiles undo them', () => {
    fc.assert(
      fc.property(between(1e-12, 1 - 1e-12), between(0.5, 60), (p, nu) => {
        // Of one unit in the last place of the quantile the density makes an error of about this size.
        const allowed = 1e-12 * Math.min(p, 1 - p) + 3e-16;
        expect(Math.abs(normalCdf(normalQuantile(p)) - p)).toBeLessThan(allowed);
        expect(Math.abs(chiSquareCdf(chiSquareQuantile(p, nu), nu) - p)).toBeLessThan(10 * allowed);
      }),
    );
  });

  it('the tails of chi-square make one', () => {
    fc.assert(
      fc.property(between(0, 500), between(0.1, 300), (value, nu) => {
        expect(Math.abs(chiSquareCdf(value, nu) + chiSquareUpperTail(value, nu) - 1)).toBeLessThan(1e-15);
      }),
    );
  });

  it("Student's t is wider than the normal distribution, and the narrower the more degrees it has", () => {
    fc.assert(
      fc.property(between(0.51, 0.999), between(1, 100), between(0.5, 50), (p, nu, more) => {
        expect(studentTQuantile(p, nu + more)).toBeLessThan(studentTQuantile(p, nu));
        expect(studentTQuantile(p, nu + more)).toBeGreaterThan(normalQuantile(p));
      }),
    );
  });
});

describe('least squares', () => {
  it('Cholesky solves what was multiplied out', () => {
    const size = fc.integer({ min: 1, max: 60 });
    fc.assert(
      fc.property(
        size.chain((n) =>
          fc.tuple(
            fc.constant(n),
            fc.array(between(-1, 1), { minLength: n * n, maxLength: n * n }),
            fc.array(between(-1, 1), { minLength: n, maxLength: n }),
          ),
        ),
        ([n, root, solution]) => {
          const matrix = new Float64Array(n * n);
          for (let i = 0; i < n; i++) {
            for (let j = 0; j < n; j++) {
              for (let k = 0; k < n; k++) matrix[i * n + j]! += root[i * n + k]! * root[j * n + k]!;
            }
            // Keeps the condition number below about n squared.
            matrix[i * n + i]! += n;
          }
          const right = Float64Array.from(solution, (_, i) =>
            solution.reduce((sum, value, j) => sum + matrix[i * n + j]! * value, 0),
          );
          expect(choleskyFactor(matrix, n)).toBe(true);
          choleskySolve(matrix, n, right);
          for (const [i, value] of solution.entries())
            expect(Math.abs(right[i]! - value)).toBeLessThan(1e-12);
        },
      ),
      { numRuns: 60 },
    );
  });

  it('a line through points of a line is that line, whatever the covariance', () => {
    fc.assert(
      fc.property(
        between(-5, 5),
        between(-5, 5),
        fc.array(between(0.1, 3), { minLength: 3, maxLength: 8 }),
        between(0, 0.9),
        (intercept, slope, sigmas, correlation) => {
          const n = sigmas.length;
          const x = Float64Array.from(sigmas, (_, i) => 12 + 0.2 * i);
          const y = x.map((value) => intercept + slope * value);
          const covariance = Float64Array.from({ length: n * n }, (_, k) => {
            const [i, j] = [Math.floor(k / n), k % n];
            return sigmas[i]! * sigmas[j]! * (i === j ? 1 : correlation);
          });
          const line = fitStraightLine(x, y, covariance)!;
          expect(Math.abs(line.slope - slope)).toBeLessThan(1e-10);
          expect(Math.abs(line.intercept - intercept)).toBeLessThan(2e-9);
          expect(line.chiSquare).toBeLessThan(1e-20);
        },
      ),
      { numRuns: 500 },
    );
  });
});

it('a quantile lies between its neighbours and rises with p', () => {
  fc.assert(
    fc.property(
      fc.array(between(-1e6, 1e6), { minLength: 1, maxLength: 50 }),
      between(0, 1),
      between(0, 1),
      (values, p, q) => {
        const [low, high] = [Math.min(p, q), Math.max(p, q)];
        expect(quantile(values, low)).toBeLessThanOrEqual(quantile(values, high) + 1e-9);
        expect(quantile(values, p)).toBeGreaterThanOrEqual(Math.min(...values));
        expect(quantile(values, p)).toBeLessThanOrEqual(Math.max(...values));
      },
    ),
  );
});
