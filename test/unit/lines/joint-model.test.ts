import { describe, expect, test } from 'vitest';
import { createJointModel } from '../../../shared-core/lines/joint-model.ts';
import { free, type JointProblem } from '../../../shared-core/lines/joint-problem.ts';
import { leverages } from '../../../shared-core/lines/leverages.ts';
import { pseudoVoigtInstrument } from '../../../shared-core/instrument/instrument-term.ts';
import { sampleModel } from '../../../shared-core/lines/sample-model.ts';
import { solveJoint } from '../../../shared-core/lines/solve-joint.ts';
import { jointProblemOf } from '../../support/joint-problem-of.ts';

/** Everything that a problem can hold: deuterium, a gas temperature, curved baselines, a pseudo-Voigt instrument. */
const plain = jointProblemOf({ seed: 21, electronsPerCubicMetre: 5e20 });
const everything: JointProblem = {
  ...plain,
  instrumentShape: pseudoVoigtInstrument(0.2),
  beliefs: {
    ...plain.beliefs,
    gasKelvin: { mean: 3000, sigma: 500 },
    deuteriumRatio: { mean: 0.3, sigma: 0.1 },
    baselineCurvature: plain.segments.map(() => free),
  },
  lines: plain.lines.map((line) => ({ ...line, widthDeparture: { mean: 0, sigma: 0.1 } })),
};

describe('the joint model', () => {
  test.each([
    ['plain', plain],
    ['everything', everything],
  ])('half the gradient that it returns is the one that finite differences give, %s', (_, problem) => {
    const model = createJointModel(problem);
    const at = Float64Array.from(model.values);
    // Away from the minimum in every direction, so that no derivative vanishes.
    model.active.forEach((parameter, index) => {
      at[parameter] = at[parameter]! + (index % 2 === 0 ? 1 : -1) * (Math.abs(at[parameter]!) * 0.01 + 1e-4);
    });
    const here = model.newEvaluation();
    model.evaluate(at, here);
    const gradient = Float64Array.from(here.right);
    expect(model.active.length).toBeGreaterThan(20);
    for (const [index, parameter] of model.active.entries()) {
      const step = 0.02 / Math.sqrt(here.normal[index * model.active.length + index]!);
      const moved = (by: number): number => {
        const point = Float64Array.from(at);
        point[parameter] = point[parameter]! + by;
        const there = model.newEvaluation();
        model.evaluate(point, there);
        return there.objective;
      };
      const slope = -(moved(step) - moved(-step)) / (4 * step);
      const size = Math.max(Math.abs(slope), Math.abs(gradient[index]!));
      expect(Math.abs(gradient[index]! - slope) / size, `parameter ${String(parameter)}`).toBeLessThan(1e-3);
    }
  });

  test('the normal matrix is symmetric and its leverages sum to the freedom that the fit takes', () => {
    const problem = jointProblemOf({ seed: 22, electronsPerCubicMetre: 1e19 });
    const model = createJointModel(problem);
    const solution = solveJoint(model, 'from-model');
    expect(solution.status).toBe('converged');
    const evaluation = model.newEvaluation();
    model.evaluate(solution.values, evaluation);
    const size = model.active.length;
    for (let i = 0; i < size; i++) {
      for (let j = 0; j < i; j++)
        expect(evaluation.normal[i * size + j]).toBe(evaluation.normal[j * size + i]);
    }
    const total = leverages({ problem, model, solution }).reduce((sum, value) => sum + value, 0);
    // Beliefs carry part of it: between the free parameters and all of them.
    const free = model.active.filter((parameter) => !Number.isFinite(model.beliefs[parameter]!.sigma)).length;
    expect(total).toBeGreaterThan(free - 1);
    expect(total).toBeLessThan(size);
  });

  test('drawn between the pixels it passes through the model of every pixel', () => {
    const model = createJointModel(everything);
    const solution = solveJoint(model, 'from-model');
    model.evaluate(solution.values, model.newEvaluation());
    for (const [index, { firstPx, endPx }] of everything.segments.entries()) {
      const curve = sampleModel({ problem: everything, model, solution }, index, 4);
      expect(curve).toHaveLength(4 * (endPx - firstPx));
      for (let px = firstPx; px < endPx; px++) {
        const drawn = curve[4 * (px - firstPx)]!;
        expect(Math.abs(drawn - model.modelled[px]!)).toBeLessThan(1e-9 * Math.abs(drawn) + 1e-9);
      }
    }
  });
});
