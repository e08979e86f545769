import { describe, expect, test } from 'vitest';
import { createJointModel } from '../../../shared-core/lines/joint-model.ts';
import { instrumentIndex, starkIndex, type JointProblem } from '../../../shared-core/lines/joint-problem.ts';
import { measureNoise } from '../../../shared-core/lines/measure-noise.ts';
import { solveJoint } from '../../../shared-core/lines/solve-joint.ts';
import { jointProblemOf } from '../../support/joint-problem-of.ts';

/** Solves as the chain does where it knows no gain: from a first guess, then twice with what was measured. */
function measured(problem: JointProblem) {
  let posed: JointProblem = { ...problem, variancePerSignal: 0, relativeMisfit: 0.05 };
  let noise = { variancePerSignal: 0, relativeMisfit: 0 };
  for (let round = 0; round < 3; round++) {
    const model = createJointModel(posed);
    const solution = solveJoint(model, 'held');
    noise = measureNoise({ problem: posed, model, solution });
    posed = { ...problem, ...noise, expected: model };
  }
  return noise;
}

describe('measureNoise', () => {
  test('finds the photon noise of a clean profile: 0.2 counts a count within a factor of two, over ten draws', () => {
    const found = Array.from({ length: 10 }, (_, seed) => measured(jointProblemOf({ seed: 60 + seed })));
    const brightest = 48_000;
    const share = found.map(({ variancePerSignal, relativeMisfit }) =>
      Math.sqrt((variancePerSignal * brightest + (relativeMisfit * brightest) ** 2) / (0.2 * brightest)),
    );
    const mean = share.reduce((sum, value) => sum + value, 0) / share.length;
    expect(mean).toBeGreaterThan(0.6);
    expect(mean).toBeLessThan(1.6);
  });

  test('counts what a profile misses as noise, so that a wrong width cannot look precise', () => {
    const problem = jointProblemOf({
      seed: 70,
      bench: { detector: { offsetCounts: 1000, gainElectronsPerCount: 5 }, instrument: { fwhmNm: 0.3 } },
    });
    const wrong: JointProblem = {
      ...problem,
      beliefs: {
        ...problem.beliefs,
        instrumentFwhmNm: { mean: 0.18, sigma: 0.0001 },
        starkFwhmNm: { mean: 0, sigma: 1e-5 },
      },
      start: new Map([
        [instrumentIndex, 0.18],
        [starkIndex, 0],
      ]),
    };
    const { variancePerSignal, relativeMisfit } = measured(wrong);
    expect(relativeMisfit).toBeLessThanOrEqual(0.1);
    // At 10,000 counts photon noise is 0.45 %; an instrument width wrong by two thirds misses by far more.
    const light = 10_000;
    expect(Math.sqrt(variancePerSignal * light + (relativeMisfit * light) ** 2) / light).toBeGreaterThan(
      0.03,
    );
  });
});
