import { expect, test } from 'vitest';
import { fitStraightLine } from '../../../shared-core/numeric/fit-straight-line.ts';
import { caseB } from '../../../shared-core/physics/case-b.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { matchCaseB } from '../../../shared-core/populations/case-b-match.ts';

const lines = [3, 4, 5, 6, 7].map((level) => hydrogenLine(level));
const upperEnergyEv = Float64Array.from(lines, (line) => line.upperEnergyEv);
const diagonal = (sigma: number): Float64Array =>
  Float64Array.from({ length: 25 }, (_, at) => (at % 6 === 0 ? sigma * sigma : 0));

/** ln(population per sublevel) of energy ratios to H-beta. */
const ordinates = (ratios: readonly number[]): Float64Array =>
  Float64Array.from(lines, (line, i) =>
    Math.log((ratios[i]! * line.wavelengthVacuumNm) / (line.upperWeight * line.transitionProbabilityPerS)),
  );

// P. J. Storey, D. G. Hummer (1995): 10 000 K, 100 electrons per cm^3, a density that the table does not hold.
const thin = ordinates([2.86316, 1, 0.46834, 0.25895, 0.15903]);

test('case B lies on a straight line that is no temperature of the gas', () => {
  const line = fitStraightLine(upperEnergyEv, thin, diagonal(0.01))!;
  expect(Math.max(...line.residuals.map(Math.abs))).toBeLessThan(0.01);
  const kelvin = -1 / (8.617333262e-5 * line.slope);
  expect(Math.abs(kelvin / 29_800 - 1)).toBeLessThan(0.03);
});

test('is recognised, also at a density between those of the table', () => {
  const plot = { upperEnergyEv, ordinate: thin, ordinateCovariance: diagonal(0.01) };
  expect(matchCaseB(plot, lines)!.kelvin).toBe(10_000);
  for (const gas of caseB) {
    const own = { ...plot, ordinate: ordinates(gas.ratios), ordinateCovariance: diagonal(0.001) };
    expect(matchCaseB(own, lines)).toBe(gas);
  }
});

test('populations of one temperature are not taken for it', () => {
  const ordinate = upperEnergyEv.map((energy) => -energy / (8.617333262e-5 * 6000));
  expect(matchCaseB({ upperEnergyEv, ordinate, ordinateCovariance: diagonal(0.02) }, lines)).toBeNull();
});

test('lines beyond the table and of other series stand aside, and two lines are too few', () => {
  const plot = { upperEnergyEv, ordinate: thin, ordinateCovariance: diagonal(0.01) };
  const paschen = { ...hydrogenLine(7), lowerLevel: 3 };
  for (const stranger of [hydrogenLine(12), paschen]) {
    // A stranger's ordinate does not count, however far off.
    const ordinate = thin.with(4, 100);
    expect(matchCaseB({ ...plot, ordinate }, [...lines.slice(0, 4), stranger])!.kelvin).toBe(10_000);
    expect(matchCaseB(plot, [lines[0]!, lines[1]!, stranger, stranger, stranger])).toBeNull();
  }
});
