import { describe, expect, test } from 'vitest';
import { exp } from '../../shared-core/numeric/portable-math.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { hydrogenLine, seriesLine, type HydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import type { Bench } from '../../shared-core/bench/bench.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const kelvin = 9000;
const alpha = hydrogenLine(3);
const relativeLight = (line: HydrogenLine): number =>
  ((line.upperWeight * line.transitionProbabilityPerS) /
    (alpha.upperWeight * alpha.transitionProbabilityPerS)) *
  exp((alpha.upperEnergyEv - line.upperEnergyEv) / (boltzmannEvPerK * kelvin));
const bench: Bench = { ...knownBench, instrument: { fwhmNm: 0.6, fwhmSigmaNm: 0.01 } };
const table = (lastNm: number): ResponseTable => ({
  name: 'response.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([360, lastNm]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([0.02, 0.02]),
});

/** A lamp whose Paschen lines are `factor` times what the Balmer lines demand, as a response wrong in the red would show. */
const withPaschen = (factor: number, seed: number, response: ResponseTable) =>
  diagnoseSimulated(
    {
      bench,
      kelvin,
      electronsPerCubicMetre: 1e19,
      seed,
      continuumElectrons: 40,
      rangeNm: [370, 1110],
      extraLines: [6, 7, 8, 9, 10].map((level) => {
        const line = seriesLine(level, 3);
        return { wavelengthNm: line.wavelengthAirNm, relativeArea: factor * relativeLight(line) };
      }),
    },
    response,
  ).diagnosis;

describe('Paschen lines in the range of the recording', () => {
  test('are fitted, take part in the temperature, and share their levels with the Balmer lines', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { lines, temperature, checks } = withPaschen(1, seed, table(1200));
      const paschen = lines.filter(({ lowerLevel }) => lowerLevel === 3);
      expect(paschen.map(({ id }) => id)).toEqual([
        'Paschen-gamma',
        'Paschen-delta',
        'Paschen-epsilon',
        'Paschen-9',
        'Paschen-10',
      ]);
      for (const { used } of paschen) expect(used).toBe(true);
      expect(Math.abs(temperature.kelvin! - kelvin)).toBeLessThan(4 * temperature.sigmaKelvin!);
      expect(checks.find(({ id }) => id === 'response-branching')!.verdict).toBe('sound');
    }
  });

  test('betray a response that is wrong in the red by a quarter', () => {
    const { checks } = withPaschen(1.25, 3, table(1200));
    expect(checks.find(({ id }) => id === 'response-branching')!.verdict).not.toBe('sound');
  });

  test('stay out where the response table does not reach, which is no reason to refuse', () => {
    const { lines, temperature } = withPaschen(1, 4, table(800));
    for (const { lowerLevel, used } of lines) expect(used).toBe(lowerLevel === 2);
    expect(temperature.status).toBe('measured');
  });
});
