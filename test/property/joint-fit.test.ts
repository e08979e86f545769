import { describe, expect, test } from 'vitest';
import { logLikelihoodDeviance } from '../../shared-core/lines/deviance.ts';
import { createJointModel } from '../../shared-core/lines/joint-model.ts';
import {
  fixedAt,
  instrumentIndex,
  lineBase,
  starkIndex,
  type JointProblem,
} from '../../shared-core/lines/joint-problem.ts';
import { solveJoint } from '../../shared-core/lines/solve-joint.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';
import { jointProblemOf } from '../support/joint-problem-of.ts';

const solve = (problem: JointProblem) => {
  const model = createJointModel(problem);
  return { model, solution: solveJoint(model, 'from-model') };
};

describe('areas, centres and widths', () => {
  test('are unbiased, and their stated uncertainties are those of their scatter (200 draws, five lines)', () => {
    const pulls: number[] = [];
    const centrePulls: number[] = [];
    // The expected electrons depend on the settings only, not on the seed.
    const truth = simulateRecording({
      bench: knownBench,
      kelvin: 7000,
      electronsPerCubicMetre: 1e19,
      continuumElectrons: 40,
      brightestPixelElectrons: 30_000,
      seed: 0,
    }).trueAreaElectrons;
    for (let seed = 0; seed < 200; seed++) {
      const problem = jointProblemOf({ seed: 1000 + seed, brightestPixelElectrons: 30_000 });
      const { model, solution } = solve(problem);
      expect(solution.status).toBe('converged');
      const size = model.parameterCount;
      for (const [index, { id }] of problem.lines.entries()) {
        const base = lineBase(index);
        pulls.push(
          (solution.values[base]! * 5 - truth.get(id)!) /
            (5 * Math.sqrt(solution.covariance[base * size + base]!)),
        );
      }
      centrePulls.push(solution.values[0]! / Math.sqrt(solution.covariance[0]!));
    }
    const mean = pulls.reduce((sum, value) => sum + value, 0) / pulls.length;
    const spread = Math.sqrt(pulls.reduce((sum, value) => sum + value * value, 0) / pulls.length);
    // 1,000 pulls, not quite independent: three standard errors are 0.10 of the mean and 0.07 of the spread.
    expect(Math.abs(mean)).toBeLessThan(0.12);
    expect(spread).toBeGreaterThan(0.92);
    expect(spread).toBeLessThan(1.08);
    // The axis carries a belief that was not drawn, so its pulls may only be narrower than one.
    expect(Math.sqrt(centrePulls.reduce((sum, value) => sum + value * value, 0) / 200)).toBeLessThan(1.2);
  });

  test('are the same from poor starts', () => {
    const reference = solve(jointProblemOf({ seed: 5, electronsPerCubicMetre: 5e20 })).solution;
    for (const [instrumentNm, starkNm] of [
      [0.1, 0.3],
      [0.35, 0],
      [0.18, 0.6],
    ] as const) {
      const start = new Map([
        [instrumentIndex, instrumentNm],
        [starkIndex, starkNm],
      ]);
      const { solution, model } = solve(jointProblemOf({ seed: 5, electronsPerCubicMetre: 5e20 }, { start }));
      expect(solution.status).toBe('converged');
      for (const parameter of model.active) {
        const sigma = Math.sqrt(reference.covariance[parameter * model.parameterCount + parameter]!);
        expect(Math.abs(solution.values[parameter]! - reference.values[parameter]!)).toBeLessThan(
          0.05 * sigma,
        );
      }
    }
  });
});

describe('statuses', () => {
  test('a fit without any pixel left is singular, never converged', () => {
    const problem = jointProblemOf({ seed: 6 });
    const { solution } = solve({ ...problem, masked: new Uint8Array(problem.masked.length).fill(1) });
    expect(solution.status).toBe('singular');
  });

  test('the chain uses no area of a fit that did not converge', () => {
    const { diagnosis } = diagnoseSimulated({
      bench: knownBench,
      kelvin: 6000,
      electronsPerCubicMetre: 1e19,
      seed: 1,
    });
    for (const { used, fitStatus } of diagnosis.lines) if (used) expect(fitStatus).toBe('converged');
    expect(diagnosis.lines.filter(({ used }) => used)).toHaveLength(5);
  });
});

test('freeing the widths lowers the deviance of a recording whose lines do not share one, and not of one whose do', () => {
  const own = { mean: 0, sigma: 0.4 };
  const gainOf = (problem: JointProblem): number => {
    const shared = solve(problem);
    const free = solve({
      ...problem,
      lines: problem.lines.map((line) => ({ ...line, widthDeparture: own })),
    });
    return logLikelihoodDeviance(problem, shared.model) - logLikelihoodDeviance(problem, free.model);
  };
  const honest = jointProblemOf({ seed: 7 });
  for (const { widthDeparture } of honest.lines) expect(widthDeparture).toEqual(fixedAt(0));
  expect(gainOf(honest)).toBeLessThan(30);
  const signal = Float64Array.from(honest.recording.netSignal);
  // H-alpha smeared over its neighbours: broader than the rest, area kept.
  const { firstPx, endPx } = honest.segments.at(-1)!;
  for (let px = firstPx + 1; px < endPx - 1; px++) {
    signal[px] =
      0.25 * honest.recording.netSignal[px - 1]! +
      0.5 * honest.recording.netSignal[px]! +
      0.25 * honest.recording.netSignal[px + 1]!;
  }
  expect(gainOf({ ...honest, recording: { ...honest.recording, netSignal: signal } })).toBeGreaterThan(100);
});
