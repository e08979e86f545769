import { gasIndex, instrumentIndex, lineBase, type Stick } from './joint-problem.ts';
import type { FittedGasTemperature } from './line-fit.ts';
import type { FitLinesInput, SolvedFit } from './solved-fit.ts';

/**
 * What the Gaussian widths say of the gas temperature, the beliefs the fit started from taken out again: for a Gaussian
 * belief (p, q^2) and result (m, v^2) the data alone say precision 1/v^2 - 1/q^2, mean (m/v^2 - p/q^2)/precision.
 *
 * Where the temperature was held, whatever widens the lines beyond the stated instrument went into the instrument width I;
 * T = T_held + (I_data^2 - I_bench^2)/(Doppler FWHM^2 per K) of the brightest line.
 *
 * @returns sigma infinite where the instrument width is not known beforehand or the data add nothing
 * @source product of Gaussian densities: [Gelman2013] sec. 2.5
 * @check  test/property/gas-temperature.test.ts
 */
export function gasFromWidths({ bench }: FitLinesInput, fit: SolvedFit): FittedGasTemperature {
  const { problem, model, solution } = fit;
  const stated = bench.lamp?.gasTemperatureK;
  if (stated !== undefined) return { kelvin: stated, kelvinSigma: 0, isGiven: true };
  const result = (parameter: number) => ({
    mean: solution.values[parameter]!,
    variance: solution.covariance[parameter * model.parameterCount + parameter]!,
  });
  const { gasKelvin, instrumentFwhmNm } = problem.beliefs;
  if (gasKelvin.sigma > 0) {
    const data = withoutBelief(result(gasIndex), gasKelvin.mean, gasKelvin.sigma);
    return { kelvin: data.mean, kelvinSigma: data.sigma, isGiven: false };
  }
  const nothing = { kelvin: gasKelvin.mean, kelvinSigma: Infinity, isGiven: false };
  if (bench.instrument?.fwhmNm === undefined) return nothing;
  const width = withoutBelief(result(instrumentIndex), instrumentFwhmNm.mean, instrumentFwhmNm.sigma);
  if (!Number.isFinite(width.sigma)) return nothing;
  const perKelvin = brightest(fit).dopplerSquaredNm2PerK;
  const stretch = width.mean * width.mean - instrumentFwhmNm.mean * instrumentFwhmNm.mean;
  const sigma = Math.sqrt(
    width.mean * width.mean * width.sigma * width.sigma +
      instrumentFwhmNm.mean * instrumentFwhmNm.mean * instrumentFwhmNm.sigma * instrumentFwhmNm.sigma,
  );
  return {
    kelvin: gasKelvin.mean + stretch / perKelvin,
    kelvinSigma: (2 * sigma) / perKelvin,
    isGiven: false,
  };
}

function withoutBelief(
  { mean, variance }: { readonly mean: number; readonly variance: number },
  beliefMean: number,
  beliefSigma: number,
): { readonly mean: number; readonly sigma: number } {
  const beliefPrecision = 1 / (beliefSigma * beliefSigma);
  const precision = 1 / variance - beliefPrecision;
  // Within rounding the data said nothing.
  if (!(precision > 1e-6 / variance)) return { mean: beliefMean, sigma: Infinity };
  return {
    mean: (mean / variance - beliefMean * beliefPrecision) / precision,
    sigma: 1 / Math.sqrt(precision),
  };
}

function brightest({ problem, solution }: SolvedFit): Stick {
  const area = (index: number): number => solution.values[lineBase(index)]!;
  const best = [...problem.lines.keys()].reduce((so, next) => (area(next) > area(so) ? next : so));
  return problem.lines[best]!.sticks[0]!;
}
