import type { ErrorComponent } from '../populations/error-component.ts';
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
export function budget({ temperature, response }: Evidence): BudgetRow[] {
  const { boltzmann, kelvin, sigmaKelvin, components } = temperature;
  if (boltzmann === null || kelvin === null || sigmaKelvin === null) return [];
  const gain = boltzmann.line.slopeGain;
  const n = gain.length;
  const parts = components.map((component) => {
    let variance = 0;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) variance += gain[i]! * gain[j]! * component.covariance[i * n + j]!;
    }
    return { component, variance: Math.max(0, variance) };
  });
  const total = parts.reduce((sum, { variance }) => sum + variance, 0);
  if (!(total > 0)) return [];
  return parts
    .filter(({ variance }) => variance > 1e-6 * total)
    .sort((a, b) => b.variance - a.variance)
    .map(({ component, variance }) => {
      const share = variance / total;
      return {
        source: component.label,
        sigmaKelvin: sigmaKelvin * Math.sqrt(share),
        share,
        remedy: remedy(component, sigmaKelvin * Math.sqrt(1 - 0.75 * share), response === null),
      };
    });
}

function remedy(component: ErrorComponent, halvedKelvin: number, isUncorrected: boolean): string {
  if (!component.isHalvedByRemedy) return `${component.remedy}.`;
  const tail = component.id === 'noise' && isUncorrected ? ', the response still unknown' : '';
  return `${component.remedy} and sigma becomes ${plain(halvedKelvin, 2)} K${tail}.`;
}
