import type { ErrorComponent } from '../populations/error-component.ts';
import type { BoltzmannFit } from '../populations/fit-boltzmann.ts';
import { effectiveDegreesOfFreedom } from '../uncertainty/gum.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

type BudgetRow = Diagnosis['budget'][number];

/**
 * Splits the variance of the temperature by cause: var(1/kT) = sum over causes of g^T V_cause g, with g the gain of
 * the slope on each ordinate; sigma_T = k T^2 sigma(1/kT). Largest first, each with what halving it would bring.
 *
 * @source law of propagation of uncertainty, [JCGM2008] 5.1.2 and 5.2.2
 * @check  test/unit/diagnosis/evidence-cases.test.ts
 */
export function budget({ temperature, response }: Evidence): BudgetRow[] {
  const { boltzmann, kelvin, sigmaKelvin, components } = temperature;
  if (boltzmann === null || kelvin === null || sigmaKelvin === null) return [];
  const parts = variancesByCause(boltzmann, components);
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
        standardUncertainty: component.standardUncertainty,
        unit: component.unit,
        sensitivityKelvin:
          component.standardUncertainty === null || component.standardUncertainty === 0
            ? null
            : (sigmaKelvin * Math.sqrt(share)) / component.standardUncertainty,
        degreesOfFreedom: component.degreesOfFreedom,
      };
    });
}

function variancesByCause({ line }: BoltzmannFit, components: readonly ErrorComponent[]) {
  const gain = line.slopeGain;
  const n = gain.length;
  return components.map((component) => {
    let variance = 0;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) variance += gain[i]! * gain[j]! * component.covariance[i * n + j]!;
    }
    return { component, variance: Math.max(0, variance) };
  });
}

/**
 * Effective degrees of freedom of the combined uncertainty; null where all components count as known.
 * @source [JCGM2008] G.4.1
 * @check  test/reference/gum.test.ts
 */
export function effectiveFreedom({ temperature }: Evidence): number | null {
  const { boltzmann, components } = temperature;
  if (boltzmann === null) return null;
  const freedom = effectiveDegreesOfFreedom(
    variancesByCause(boltzmann, components).map(({ component, variance }) => ({
      variance,
      degreesOfFreedom: component.degreesOfFreedom ?? Infinity,
    })),
  );
  return Number.isFinite(freedom) ? freedom : null;
}

function remedy(component: ErrorComponent, halvedKelvin: number, isUncorrected: boolean): string {
  if (!component.isHalvedByRemedy) return `${component.remedy}.`;
  const tail = component.id === 'noise' && isUncorrected ? ', the response still unknown' : '';
  return `${component.remedy} and sigma becomes ${plain(halvedKelvin, 2)} K${tail}.`;
}
