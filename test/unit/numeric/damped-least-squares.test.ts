import { describe, expect, test } from 'vitest';
import { fitNonlinear } from '../../../shared-core/numeric/damped-least-squares.ts';
import type { ModelFunction } from '../../../shared-core/numeric/least-squares-problem.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { expectClose } from '../../support/expect-close.ts';
import { leastSquaresCases } from '../../support/least-squares-cases.ts';

const { decay } = leastSquaresCases;
const starts = [Float64Array.from([50, 1, 20])];

/** b0 exp(-b1 x) + b2 */
const decayModel = (x: readonly number[]): ModelFunction => ({
  evaluate: (b, modelled) => {
    for (const [i, at] of x.entries()) modelled[i] = b[0]! * Math.exp(-b[1]! * at) + b[2]!;
  },
  differentiate: (b, jacobian) => {
    for (const [i, at] of x.entries()) {
      const share = Math.exp(-b[1]! * at);
      jacobian[i] = share;
      jacobian[x.length + i] = -at * b[0]! * share;
      jacobian[2 * x.length + i] = 1;
    }
  },
});
const model = decayModel(decay.x);

/** b0 sin(b1 x): a minimum at every turn of the wave. */
const waveModel = (x: readonly number[]): ModelFunction => ({
  evaluate: (b, modelled) => {
    for (const [i, at] of x.entries()) modelled[i] = b[0]! * Math.sin(b[1]! * at);
  },
  differentiate: (b, jacobian) => {
    for (const [i, at] of x.entries()) {
      jacobian[i] = Math.sin(b[1]! * at);
      jacobian[x.length + i] = b[0]! * at * Math.cos(b[1]! * at);
    }
  },
});

describe('weights', () => {
  test('given: values, covariance and chi-square in 50 digits', () => {
    const fit = fitNonlinear({
      model,
      observed: Float64Array.from(decay.weightedData),
      starts,
      variance: Float64Array.from(decay.sigma, (sigma) => sigma * sigma),
    });
    const because = 'mpmath, 50 digits';
    expect(fit.status).toBe('converged');
    expect(fit.degreesOfFreedom).toBe(7);
    expectClose(fit.chiSquare, { expected: decay.weighted.chiSquare, rel: 1e-12, because });
    for (const [j, expected] of decay.weighted.values.entries()) {
      expectClose(fit.values[j]!, { expected, rel: 1e-9, because });
      for (const [k, covariance] of decay.weighted.covariance[j]!.entries())
        expectClose(fit.covariance[3 * j + k]!, { expected: covariance, rel: 1e-8, because });
    }
  });

  test('following the model: the root of the quasi-likelihood equations in 50 digits', () => {
    const fit = fitNonlinear({
      model,
      observed: Float64Array.from(decay.counts),
      starts,
      variance: (modelled, variance) => {
        for (const [i, mean] of modelled.entries()) variance[i] = Math.max(mean, 0) + decay.readVariance;
      },
    });
    const because = 'mpmath, 50 digits';
    expect(fit.status).toBe('converged');
    // Renewal stops at 0.001 of a standard deviation.
    for (const [j, expected] of decay.followed.values.entries()) {
      const deviation = Math.sqrt(decay.followed.covariance[j]![j]!);
      expectClose(fit.values[j]!, { expected, abs: 1e-3 * deviation, because });
      expectClose(fit.covariance[4 * j]!, {
        expected: decay.followed.covariance[j]![j]!,
        rel: 2e-3,
        because,
      });
    }
    expectClose(fit.chiSquare, { expected: decay.followed.chiSquare, rel: 1e-3, because });
  });

  test('that follow keep Poisson counts unbiased where weights from the counts themselves do not', () => {
    const random = createRandom(11);
    const truth = [40, 0.6, 5];
    const x = Array.from({ length: 40 }, (_, i) => 0.2 * i);
    const pulls: number[] = [];
    const naive: number[] = [];
    for (let draw = 0; draw < 200; draw++) {
      const observed = Float64Array.from(x, (at) =>
        random.poisson(truth[0]! * Math.exp(-truth[1]! * at) + truth[2]!),
      );
      const fitWith = (variance: Float64Array | ((modelled: Float64Array, out: Float64Array) => void)) =>
        fitNonlinear({ model: decayModel(x), observed, starts: [Float64Array.from([30, 1, 3])], variance });
      const followed = fitWith((modelled, out) => {
        for (const [i, mean] of modelled.entries()) out[i] = Math.max(mean, 1);
      });
      const fixed = fitWith(observed.map((count) => Math.max(count, 1)));
      expect(followed.status).toBe('converged');
      pulls.push((followed.values[2]! - truth[2]!) / Math.sqrt(followed.covariance[8]!));
      naive.push((fixed.values[2]! - truth[2]!) / Math.sqrt(fixed.covariance[8]!));
    }
    const mean = (list: readonly number[]): number =>
      list.reduce((sum, value) => sum + value, 0) / list.length;
    // Three standard errors of the mean of 200 are 0.21, of the spread 0.15.
    expect(Math.abs(mean(pulls))).toBeLessThan(0.21);
    expect(mean(naive)).toBeLessThan(-0.5);
    expect(Math.abs(Math.sqrt(mean(pulls.map((pull) => pull * pull))) - 1)).toBeLessThan(0.18);
  });
});

describe('bounds', () => {
  const observed = Float64Array.from(decay.weightedData);
  const variance = Float64Array.from(decay.sigma, (sigma) => sigma * sigma);
  const lowest = Float64Array.from(decay.lowest);
  const highest = Float64Array.from(decay.highest);

  test('one that holds: the others are fitted with it, and it has no variance', () => {
    const fit = fitNonlinear({ model, observed, starts, variance, lowest, highest });
    const because = 'SciPy least_squares, trust region reflective';
    expect(fit.status).toBe('converged');
    expect(fit.isHeld).toEqual([false, false, true]);
    expect(fit.values[2]).toBe(14);
    expect(fit.degreesOfFreedom).toBe(8);
    expectClose(fit.chiSquare, { expected: decay.bounded.chiSquare, rel: 1e-9, because });
    for (const j of [0, 1]) {
      expectClose(fit.values[j]!, { expected: decay.bounded.values[j]!, rel: 1e-6, because });
      for (const k of [0, 1])
        expectClose(fit.covariance[3 * j + k]!, {
          expected: decay.bounded.covariance[j]![k]!,
          rel: 1e-5,
          because,
        });
    }
    for (const at of [2, 5, 6, 7, 8]) expect(fit.covariance[at]).toBe(0);
  });

  test('that hold nothing change nothing, and a start outside is moved onto them', () => {
    const wide = { lowest: Float64Array.from([0, 0, 0]), highest: Float64Array.from([95, 0.9, 19]) };
    const free = fitNonlinear({ model, observed, starts, variance });
    const fit = fitNonlinear({
      model,
      observed,
      starts: [Float64Array.from([500, 7, -9])],
      variance,
      ...wide,
    });
    expect(fit.status).toBe('converged');
    expect(fit.isHeld).toEqual([false, false, false]);
    for (const [j, expected] of free.values.entries())
      expectClose(fit.values[j]!, { expected, rel: 1e-9, because: 'the fit without bounds' });
  });

  test('that meet fix a parameter', () => {
    const fixed = { lowest: Float64Array.from([0, 0.7, 0]), highest: Float64Array.from([200, 0.7, 50]) };
    const fit = fitNonlinear({ model, observed, starts, variance, ...fixed });
    expect(fit.status).toBe('converged');
    expect(fit.values[1]).toBe(0.7);
    expect(fit.isHeld[1]).toBe(true);
    expect(fit.degreesOfFreedom).toBe(8);
  });

  test('that hold everything leave nothing to fit', () => {
    const here = Float64Array.from([80, 0.5, 10]);
    const fit = fitNonlinear({ model, observed, starts: [here], variance, lowest: here, highest: here });
    expect(fit.status).toBe('converged');
    expect([...fit.values]).toEqual([80, 0.5, 10]);
    expect(fit.degreesOfFreedom).toBe(10);
  });
});

describe('starts', () => {
  const x = Array.from({ length: 40 }, (_, i) => 0.25 * i);
  const observed = Float64Array.from(x, (at) => 2 * Math.sin(3 * at));
  const from = (frequency: number) => Float64Array.from([1, frequency]);

  test('a start in the wrong valley ends there; several find the right one, and say how each ended', () => {
    const wrong = fitNonlinear({ model: waveModel(x), observed, starts: [from(4.5)] });
    expect(wrong.chiSquare).toBeGreaterThan(1);
    const fit = fitNonlinear({ model: waveModel(x), observed, starts: [1.5, 2.9, 4.5].map(from) });
    expect(fit.status).toBe('converged');
    expectClose(fit.values[0]!, { expected: 2, rel: 1e-9, because: 'made with it' });
    expectClose(fit.values[1]!, { expected: 3, rel: 1e-9, because: 'made with it' });
    expect(fit.byStart).toHaveLength(3);
    expect(fit.byStart[1]!.chiSquare).toBeLessThan(1e-20);
    expect(fit.byStart[2]!.chiSquare).toBe(wrong.chiSquare);
  });

  test('a fit needs one', () => {
    expect(() => fitNonlinear({ model: waveModel(x), observed, starts: [] })).toThrow('start');
  });
});

describe('statuses', () => {
  const observed = Float64Array.from(decay.weightedData);

  test('singular: two parameters that do the same', () => {
    const twice: ModelFunction = {
      evaluate: (b, modelled) => modelled.fill(b[0]! + 2 * b[1]!),
      differentiate: (_b, jacobian) => {
        jacobian.fill(1, 0, 10);
        jacobian.fill(2, 10);
      },
    };
    const fit = fitNonlinear({ model: twice, observed, starts: [Float64Array.from([1, 1])] });
    expect(fit.status).toBe('singular');
    expect([...fit.covariance]).toEqual([0, 0, 0, 0]);
  });

  test('singular: a parameter that does nothing', () => {
    const idle: ModelFunction = {
      evaluate: (b, modelled) => modelled.fill(b[0]!),
      differentiate: (_b, jacobian) => {
        jacobian.fill(1, 0, 10);
        jacobian.fill(0, 10);
      },
    };
    const fit = fitNonlinear({ model: idle, observed, starts: [Float64Array.from([1, 1])] });
    expect(fit.status).toBe('singular');
  });

  test('singular: fewer observations than parameters', () => {
    const fit = fitNonlinear({ model: decayModel([0, 1]), observed: Float64Array.from([3, 2]), starts });
    expect(fit.status).toBe('singular');
  });

  test('iteration-limit', () => {
    const fit = fitNonlinear({ model, observed, starts, maxEvaluations: 2 });
    expect(fit.status).toBe('iteration-limit');
    // Two attempts of two.
    expect(fit.evaluationCount).toBe(4);
  });

  test('stalled: a start without a finite model, and derivatives of the wrong sign', () => {
    const nowhere = fitNonlinear({ model, observed, starts: [Float64Array.from([1, -1e4, 0])] });
    expect(nowhere.status).toBe('stalled');
    const wrong: ModelFunction = {
      evaluate: model.evaluate,
      differentiate: (b, jacobian) => {
        model.differentiate(b, jacobian);
        for (const [at, value] of jacobian.entries()) jacobian[at] = -value;
      },
    };
    expect(fitNonlinear({ model: wrong, observed, starts }).status).toBe('stalled');
  });

  test('a converged start counts more than one that is not, whatever its chi-square', () => {
    const fit = fitNonlinear({ model, observed, starts: [Float64Array.from([1, -1e4, 0]), starts[0]!] });
    expect(fit.status).toBe('converged');
    expect(fit.byStart.map(({ status }) => status)).toEqual(['stalled', 'converged']);
  });
});

test('units do not matter: parameters scaled by 1e12 and 1e-9 are found to the same digits', () => {
  const scales = [1e12, 1e-9, 1];
  const scaled: ModelFunction = {
    evaluate: (b, modelled) => {
      model.evaluate(
        b.map((value, j) => value / scales[j]!),
        modelled,
      );
    },
    differentiate: (b, jacobian) => {
      model.differentiate(
        b.map((value, j) => value / scales[j]!),
        jacobian,
      );
      for (const [at, value] of jacobian.entries()) jacobian[at] = value / scales[Math.floor(at / 10)]!;
    },
  };
  const observed = Float64Array.from(decay.weightedData);
  const plain = fitNonlinear({ model, observed, starts });
  const fit = fitNonlinear({
    model: scaled,
    observed,
    starts: [starts[0]!.map((value, j) => value * scales[j]!)],
  });
  expect(fit.status).toBe('converged');
  for (const [j, scale] of scales.entries()) {
    expectClose(fit.values[j]! / scale, {
      expected: plain.values[j]!,
      rel: 1e-9,
      because: 'the fit in plain units',
    });
    expectClose(Math.sqrt(fit.covariance[4 * j]!) / scale, {
      expected: Math.sqrt(plain.covariance[4 * j]!),
      rel: 1e-8,
      because: 'the fit in plain units',
    });
  }
});
