import { exp } from '../numeric/portable-math.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { depthText } from './optical-depths.ts';
import { plain } from './plain-number.ts';

/** Words and numbers of the self-absorption of H-alpha. */
export function selfAbsorptionSection(evidence: Evidence): Diagnosis['selfAbsorption'] {
  const { selfAbsorption: found, isSelfAbsorptionApplied, temperature } = evidence;
  const { kelvin, sigmaKelvin, lowKelvin, highKelvin } = found.corrected ?? temperature;
  const hasNumbers = kelvin !== null && sigmaKelvin !== null && lowKelvin !== null && highKelvin !== null;
  return {
    status: found.status,
    deficit: found.deficit,
    deficitSigma: found.deficitSigma,
    opticalDepth: found.opticalDepth,
    low: found.low,
    high: found.high,
    coverage: temperature.coverage,
    areaFactor: found.areaFactor,
    predictedHBetaFactor: found.predictedHBetaFactor,
    isConsistent: found.isConsistent,
    corrected: found.corrected !== null && hasNumbers ? { kelvin, sigmaKelvin, lowKelvin, highKelvin } : null,
    isApplied: isSelfAbsorptionApplied,
    text: [selfAbsorptionText(evidence), independentText(evidence)].filter((text) => text !== '').join(' '),
  };
}

function selfAbsorptionText({ selfAbsorption: found, isSelfAbsorptionApplied }: Evidence): string {
  if (found.status === 'not-testable') return `Not tested: ${found.reason}.`;
  if (found.status === 'none-seen') {
    const bound = found.high === null ? '' : `; an optical depth above ${plain(found.high, 2)} would show`;
    return `H-alpha lies where the other lines expect it to within its uncertainty${bound}.`;
  }
  const missing = 100 * (1 - exp(-(found.deficit ?? 0)));
  const seen = `H-alpha lacks ${plain(missing, 2)} % of what the other lines expect (${plain(found.significance ?? 0, 2)} sigma)`;
  if (found.opticalDepth === null) {
    return `${seen}, but no one optical depth explains all lines: look for clipping, a wrong response or two groups of electrons.`;
  }
  const range =
    found.high === null
      ? `at least ${plain(found.low ?? 0, 2)}`
      : `${plain(found.low ?? 0, 2)} to ${plain(found.high, 2)}`;
  const beta =
    found.predictedHBetaFactor === null
      ? ''
      : `; H-beta then loses ${plain(100 * (1 - found.predictedHBetaFactor), 2)} %`;
  const agreement =
    found.isConsistent === null ? 'With these lines nothing tests that.' : 'All lines agree with that.';
  const kelvin = found.corrected?.kelvin ?? null;
  const offer =
    kelvin === null
      ? ''
      : isSelfAbsorptionApplied
        ? ' The temperature is corrected for it.'
        : ` Corrected for it, the temperature would be ${plain(kelvin, 4)} K.`;
  return `${seen}, as an optical depth of ${plain(found.opticalDepth, 2)} (${range}) would take${beta}. ${agreement}${offer} Clipping of H-alpha and a response table too high in the red look the same.`;
}

/** What a measurement with a light source or mirror behind the tube says of the depth found here. */
function independentText({ selfAbsorption: found, opticalDepths }: Evidence): string {
  const measured =
    opticalDepths.find(({ lineId, status }) => lineId === 'H-alpha' && status === 'measured') ??
    opticalDepths.find(({ lineId, status }) => lineId === 'H-alpha' && status === 'upper-limit');
  if (measured === undefined) return '';
  const { low, high } = measured.opticalDepth;
  const how = measured.method === 'mirror' ? 'with a mirror' : 'by absorption';
  const seen = `Measured ${how}, the depth is ${measured.status === 'measured' ? depthText(measured) : `below ${plain(high ?? 0, 2)}`}`;
  if (found.status === 'not-testable') return `${seen}.`;
  const agrees =
    (high === null || high >= (found.low ?? 0)) && (found.high === null || (low ?? 0) <= found.high);
  return `${seen}, which ${agrees ? 'agrees' : 'does not agree'}.`;
}
