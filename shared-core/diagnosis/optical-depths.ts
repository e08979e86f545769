import type { OpticalDepthFinding } from '../optical-depth/finding.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** Depths measured with a mirror or a light source behind the tube, a line and method each. */
export function opticalDepthSection({
  opticalDepths,
  temperature,
  bench,
}: Evidence): Diagnosis['opticalDepths'] {
  const pathMm = bench.lamp?.pathLengthMm;
  return opticalDepths.map((found) => {
    const { lineId, method, status, opticalDepth, columnPerSquareMetre: column, seen } = found;
    const mirror = seen?.kind === 'mirror' ? seen : null;
    const width = seen?.kind === 'absorption' ? seen : null;
    return {
      lineId,
      method,
      status,
      opticalDepth: opticalDepth.value,
      low: opticalDepth.low,
      high: opticalDepth.high,
      coverage: temperature.coverage,
      columnDensityPerSquareMetre: column.value,
      columnDensityLowPerSquareMetre: column.low,
      columnDensityHighPerSquareMetre: column.high,
      lowerLevelDensityPerCubicMetre:
        column.value === null || pathMm === undefined ? null : column.value / (pathMm * 1e-3),
      areaFactor: found.areaFactor,
      areaFactorFrom: found.areaFactorFrom,
      ratio: mirror?.ratio ?? null,
      ratioSigma: mirror?.ratioSigma ?? null,
      thinRatio: mirror?.thinRatio ?? null,
      thinRatioSigma: mirror?.thinRatioSigma ?? null,
      equivalentWidthNm: width?.equivalentWidthNm ?? null,
      equivalentWidthSigmaNm: width?.equivalentWidthSigmaNm ?? null,
      isResolved: found.isResolved,
      profile: found.profile.map((pixel) => ({ ...pixel })),
      text: textOf(found, pathMm),
    };
  });
}

function textOf(found: OpticalDepthFinding, pathMm: number | undefined): string {
  const { lineId, status, opticalDepth, areaFactor, areaFactorFrom } = found;
  if (status === 'not-determined') return `${lineId}: not determined, ${found.reason}.`;
  const leaves =
    areaFactor === null
      ? ''
      : `; ${plain(100 * areaFactor, 3)} % of its light leaves the tube${areaFactorFrom === lineId ? '' : `, as the column of ${areaFactorFrom!} has it`}`;
  if (status === 'upper-limit') {
    return `${lineId} ${seenText(found)}: no absorption stands out, the optical depth is below ${plain(opticalDepth.high!, 2)}${leaves}.`;
  }
  return `${lineId} ${seenText(found)}: optical depth ${depthText(found)}${leaves}.${columnText(found, pathMm)}`;
}

function seenText({ seen }: OpticalDepthFinding): string {
  if (seen === null) return '';
  if (seen.kind === 'absorption') {
    return `has an equivalent width of ${plain(1000 * seen.equivalentWidthNm, 3)} pm (sigma ${plain(1000 * seen.equivalentWidthSigmaNm, 2)}) in the light of the source`;
  }
  return `grows ${plain(seen.ratio, 3)} times (sigma ${plain(seen.ratioSigma, 2)}) with the mirror, thin lines ${plain(seen.thinRatio, 3)} times (sigma ${plain(seen.thinRatioSigma, 2)})`;
}

/** "1.02 (0.85 to 1.2)", or from below only where the depth is not bounded. */
export function depthText({ opticalDepth: { value, low, high } }: OpticalDepthFinding): string {
  if (high === null || value === null) return `at least ${plain(low ?? 0, 2)}`;
  return `${plain(value, 3)} (${plain(low ?? 0, 2)} to ${plain(high, 2)})`;
}

function columnText(
  { columnPerSquareMetre: { value } }: OpticalDepthFinding,
  pathMm: number | undefined,
): string {
  if (value === null) return '';
  const density =
    pathMm === undefined ? '' : `, ${plain(value / (pathMm * 1e-3), 2)} per m^3 over ${plain(pathMm)} mm`;
  return ` Atoms in n = 2 along the line of sight: ${plain(value, 2)} per m^2${density}.`;
}
