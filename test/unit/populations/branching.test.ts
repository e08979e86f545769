import { expect, test } from 'vitest';
import { hydrogenLine, transitionProbabilityPerS } from '../../../shared-core/physics/hydrogen.ts';
import { branchingPairs } from '../../../shared-core/populations/branching.ts';
import { madeUpInput } from '../../support/made-up-fits.ts';

/** Paschen lines of n = 6 and 7, and Balmer lines of n = 5 to 7; vacuum wavelengths from the Rydberg formula. */
const paschen = [6, 7].map((level) => ({
  ...hydrogenLine(level),
  id: `Paschen-${String(level)}`,
  lowerLevel: 3,
  wavelengthVacuumNm: 1e9 / (10_967_758.34 * (1 / 9 - 1 / level ** 2)),
  wavelengthAirNm: 1e9 / (10_967_758.34 * (1 / 9 - 1 / level ** 2)) / 1.000274,
  transitionProbabilityPerS: transitionProbabilityPerS(level, 3),
}));
const lines = [...[5, 6, 7].map((level) => hydrogenLine(level)), ...paschen];
const made = lines.map((line) => ({
  line,
  area: line.upperWeight * line.transitionProbabilityPerS,
  relativeSigma: 0.01,
}));
const table = (infrared: number) => ({
  name: 'r.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([380, 700, 900, 1300]),
  response: Float64Array.from([1, 1, infrared, infrared]),
  relativeSigma: Float64Array.from([0.02, 0.02, 0.02, 0.02]),
});

test('lines from one upper level agree where the response is right', () => {
  const pairs = branchingPairs(madeUpInput(made), [0, 1, 2, 3, 4]);
  expect(pairs.map(({ lineIds }) => lineIds.join('/'))).toEqual(['Paschen-6/H-delta', 'Paschen-7/H-epsilon']);
  for (const { ratio, z } of pairs) {
    expect(ratio).toBeCloseTo(1, 12);
    expect(Math.abs(z)).toBeLessThan(1e-9);
  }
  // Two areas of 1 % and two transition probabilities of 1e-4.
  expect(pairs[0]!.sigma).toBeCloseTo(Math.sqrt(2e-4 + 2e-8), 9);
});

test('a response twenty per cent too high in the infrared shows as that ratio', () => {
  const input = madeUpInput(made, { response: table(1.2), bench: { response: { file: 'r.csv' } } });
  const [first] = branchingPairs(input, [0, 1, 2, 3, 4]);
  expect(first!.ratio).toBeCloseTo(1 / 1.2, 9);
  // Areas and table add up: sqrt(2 (1 %^2 + 2 %^2)), and nothing of the gas.
  expect(Math.abs(first!.sigma / first!.ratio / Math.sqrt(2 * (1e-4 + 4e-4)) - 1)).toBeLessThan(0.01);
  expect(first!.z).toBeLessThan(-5);
});

test('lines left out of the list, and lines alone on their level, make no pair', () => {
  expect(branchingPairs(madeUpInput(made), [0, 1, 4])).toEqual([]);
});
