import type { ErrorComponent } from '../populations/error-component.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

type BudgetRow = Diagnosis['budget'][number];

/** Shares below this are left out: nothing that anyone could act on. */
const leastShare = 1e-6;

/**
 * The parts of the temperature's uncertainty by cause, sigma_T = k T^2 sigma(1/kT): largest first, each with what halving it
 * would bring.
 *
 * @source law of propagation of uncertainty, [JCGM2008] 5.1.2 and 5.2.2
 * @check  test/unit/diagnosis/evidence-cases.test.ts
 */
export function budget({ temperature, response }: Evidence): BudgetRow[] {
  const { combined, kelvin, sigmaKelvin, components } = temperature;
  if (combined === null || kelvin === null || sigmaKelvin === null) return [];
  return components
    .map((component, index) => ({ component, share: combined.shares[index]! }))
    .filter(({ share }) => share > leastShare)
    .sort((a, b) => b.share - a.share)
    .map(({ component, share }) => {
      const { standardUncertainty } = component;
      const ownKelvin = sigmaKelvin * Math.sqrt(share);
      return {
        source: component.label,
        sigmaKelvin: ownKelvin,
        share,
        remedy: remedy(component, sigmaKelvin * Math.sqrt(1 - 0.75 * share), response === null),
        standardUncertainty,
        unit: component.unit,
        sensitivityKelvin: standardUncertainty ? ownKelvin / standardUncertainty : null,
        ...relativeRange(component),
        degreesOfFreedom: component.degreesOfFreedom,
      };
    });
}

/** What a cause does to the areas of the lines: the smallest and the largest relative standard uncertainty. */
function relativeRange({ covariance }: ErrorComponent) {
  const n = Math.round(Math.sqrt(covariance.length));
  const sigmas = Array.from({ length: n }, (_, i) => Math.sqrt(Math.max(0, covariance[i * n + i]!)));
  return { smallestRelative: Math.min(...sigmas), largestRelative: Math.max(...sigmas) };
}

/** Of the combined uncertainty, by Welch and Satterthwaite; null where all components count as known. */
export function effectiveFreedom({ temperature }: Evidence): number | null {
  const freedom = temperature.combined?.effectiveDegreesOfFreedom ?? Infinity;
  return Number.isFinite(freedom) ? freedom : null;
}

function remedy(component: ErrorComponent, halvedKelvin: number, isUncorrected: boolean): string {
  if (!component.isHalvedByRemedy) return `${component.remedy}.`;
  const tail = component.id === 'noise' && isUncorrected ? ', the response still unknown' : '';
  return `${component.remedy} and sigma becomes ${plain(halvedKelvin, 2)} K${tail}.`;
}
