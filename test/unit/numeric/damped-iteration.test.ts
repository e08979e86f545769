import { describe, expect, test } from 'vitest';
import {
  minimise,
  type DampedEngine,
  type IterationRule,
} from '../../../shared-core/numeric/damped-iteration.ts';

const rule: IterationRule = {
  firstDamping: 0,
  leastDamping: 1e-4,
  isLast: (promised) => promised < 1e-12,
  resolution: () => 1e-15,
  isSettled: () => true,
  maxRounds: 1,
  maxEvaluations: 100,
};

interface Curve {
  readonly residual: (x: number) => number;
  readonly slope: (x: number) => number;
  /** Factor by which the equations think the objective more curved than it is. */
  readonly stiffness?: number;
  readonly reweigh?: () => void;
}

/** One residual of one parameter, plus a constant that the parameter cannot touch; records what is asked of it. */
function engineFor(
  { residual, slope, stiffness = 1, reweigh = () => undefined }: Curve,
  start: number,
  constant = 0,
) {
  let here = start;
  let step = 0;
  let tried = 0;
  const lengths: number[] = [];
  const dampings: number[] = [];
  const objective = (x: number): number => residual(x) ** 2 + constant;
  const engine: DampedEngine = {
    findStep: (damping) => {
      dampings.push(damping);
      const derivative = slope(here);
      if (derivative === 0 && damping === 0) return null;
      step = (-residual(here) * derivative) / (stiffness * derivative ** 2 * (1 + damping) || 1);
      return -step * derivative * residual(here);
    },
    tryStep: (length) => {
      lengths.push(length);
      tried = here + length * step;
      return false;
    },
    gain: () => objective(here) - objective(tried),
    accept: () => {
      here = tried;
    },
    finish: () => {
      here += step;
    },
    reweigh,
  };
  return { engine, lengths, dampings, at: () => here };
}

describe('steps', () => {
  test('a straight problem takes one step and one look', () => {
    const { engine, at, dampings } = engineFor({ residual: (x) => 2 * (x - 3), slope: () => 2 }, 10);
    const outcome = minimise(engine, rule);
    expect(outcome).toEqual({ status: 'converged', gained: 196, evaluationCount: 1 });
    expect(at()).toBe(3);
    expect(dampings).toEqual([0, 0]);
  });

  test('a step that leads uphill is repeated shorter and shorter, and damping goes when it is no longer needed', () => {
    // Undamped steps for atan diverge from beyond 1.39.
    const { engine, at, dampings } = engineFor({ residual: Math.atan, slope: (x) => 1 / (1 + x * x) }, 3);
    expect(minimise(engine, rule).status).toBe('converged');
    expect(at()).toBeCloseTo(0, 10);
    expect(dampings.slice(0, 4)).toEqual([0, 1e-3, 2e-3, 8e-3]);
    expect(dampings.at(-1)).toBe(0);
  });

  test('steps that keep falling short are lengthened', () => {
    // Every step of the equations goes a third of the way.
    const { engine, at, lengths } = engineFor({ residual: (x) => x, slope: () => 1, stiffness: 3 }, 1);
    expect(minimise(engine, rule).status).toBe('converged');
    expect(lengths.slice(0, 2)).toEqual([1, expect.closeTo(3, 12)]);
    expect(at()).toBeCloseTo(0, 6);
  });

  test('a point where the objective is no number is a step too far', () => {
    const { engine, at } = engineFor({ residual: (x) => Math.log(x), slope: (x) => 1 / x }, 8);
    expect(minimise(engine, rule).status).toBe('converged');
    expect(at()).toBeCloseTo(1, 9);
  });
});

describe('statuses', () => {
  test('stalled: derivatives of the wrong sign promise gains that never come', () => {
    const { engine, at } = engineFor({ residual: (x) => x - 1, slope: () => -1 }, 5, 1);
    expect(minimise(engine, rule).status).toBe('stalled');
    expect(at()).toBe(5);
  });

  test('singular: nothing depends on the parameter', () => {
    const { engine } = engineFor({ residual: () => 1, slope: () => 0 }, 5);
    expect(minimise(engine, rule)).toMatchObject({ status: 'singular', evaluationCount: 0 });
  });

  test('singular: no damping helps', () => {
    const { engine } = engineFor({ residual: () => 1, slope: () => 1 }, 5);
    expect(minimise({ ...engine, findStep: () => null }, rule).status).toBe('singular');
  });

  test('iteration-limit: no more points than allowed', () => {
    const { engine, lengths } = engineFor({ residual: Math.atan, slope: (x) => 1 / (1 + x * x) }, 1.3);
    expect(minimise(engine, { ...rule, maxEvaluations: 3 })).toMatchObject({
      status: 'iteration-limit',
      evaluationCount: 3,
    });
    expect(lengths).toHaveLength(3);
  });
});

describe('weights', () => {
  test('are renewed until a renewal gains nothing', () => {
    let target = 0;
    const curve = {
      residual: (x: number) => x - target,
      slope: () => 1,
      reweigh: () => (target = 1 + target / 2),
    };
    const { engine, at } = engineFor(curve, 4);
    const outcome = minimise(engine, {
      ...rule,
      maxRounds: 60,
      isSettled: (gained, round) => round > 0 && gained < 1e-18,
    });
    expect(outcome.status).toBe('converged');
    expect(at()).toBeCloseTo(2, 5);
  });

  test('that never settle are a limit reached, not an answer', () => {
    let target = 0;
    const curve = { residual: (x: number) => x - target, slope: () => 1, reweigh: () => (target += 1) };
    const outcome = minimise(engineFor(curve, 4).engine, {
      ...rule,
      maxRounds: 5,
      isSettled: (gained) => gained < 0.1,
    });
    expect(outcome.status).toBe('iteration-limit');
  });
});
