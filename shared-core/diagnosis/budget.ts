import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

type BudgetRow = Diagnosis['budget'][number];

/**
 * Splits the variance of the temperature by cause: var(1/kT) = sum over causes of g^T V_cause g, with g the gain of
 * the slope on each ordinate; sigma_T = k T^2 sigma(1/kT). Largest first, each with what halving it would bring.
 *
 * @source law of propagation of uncertainty, GUM (JCGM 100:2008) 5.1.2 and 5.2.2
 * @check  test/unit/diagnosis/evidence-cases.test.ts
 */
export function budget({ temperature, response, fits }: Evidence): BudgetRow[] {
  const { boltzmann, kelvin, sigmaKelvin, components } = temperature;
  if (boltzmann === null || kelvin === null || sigmaKelvin === null) return [];
  const gain = boltzmann.line.slopeGain;
  const n = gain.length;
  const isWidened = temperature.used.some((index) => fits.fits[index]!.widening > 1);
  const parts = components.map(({ id, covariance }) => {
    let variance = 0;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const scale = id === 'noise' ? boltzmann.expectedArea[i]! * boltzmann.expectedArea[j]! : 1;
        variance += (gain[i]! * gain[j]! * covariance[i * n + j]!) / scale;
      }
    }
    return { id, variance: Math.max(0, variance) };
  });
  const total = parts.reduce((sum, { variance }) => sum + variance, 0);
  if (!(total > 0)) return [];
  return parts
    .filter(({ variance }) => variance > 1e-6 * total)
    .sort((a, b) => b.variance - a.variance)
    .map(({ id, variance }) => {
      const share = variance / total;
      const halved = sigmaKelvin * Math.sqrt(1 - 0.75 * share);
      return {
        source: sourceName(id, isWidened),
        sigmaKelvin: sigmaKelvin * Math.sqrt(share),
        share,
        remedy: remedy(id, halved, { isUncorrected: response === null, isWidened }),
      };
    });
}

function sourceName(id: 'noise' | 'response' | 'axis', isWidened: boolean): string {
  if (id === 'noise') return isWidened ? 'noise and misfit of the line areas' : 'noise of the line areas';
  return id === 'response' ? 'spectral response' : 'wavelength axis';
}

function remedy(
  id: 'noise' | 'response' | 'axis',
  halvedKelvin: number,
  { isUncorrected, isWidened }: { readonly isUncorrected: boolean; readonly isWidened: boolean },
): string {
  const becomes = `and sigma becomes ${plain(halvedKelvin, 2)} K`;
  if (id === 'noise' && isWidened) {
    return 'Measure the instrument profile and check focus and slit: more light does not lower a misfit.';
  }
  if (id === 'noise') {
    return `Collect four times the light (exposure or repeats) ${becomes}${isUncorrected ? ', the response still unknown' : ''}.`;
  }
  return id === 'response'
    ? `Halve the uncertainty of the response table ${becomes}.`
    : `Halve the axis uncertainty ${becomes}.`;
}
