import type { HydrogenLight } from '../../shared-core/identify/hydrogen-light.ts';
import { createPlaceMeter, type PlaceMeter } from '../../shared-core/identify/place-meter.ts';
import type { CorrectedRecording } from '../../shared-core/noise/corrected-recording.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';

export const fwhmNm = 0.3;
const pixelNm = 0.08;
const pixelCount = 1500;
const gaussianSigmaNm = fwhmNm / 2.3548200450309493;

/** A line with an area in counts at a place; one unit area is spread over pixels by the instrument. */
export interface PlacedLight {
  readonly nm: number;
  readonly area: number;
}

/** 500 to 620 nm with a tilted continuum, white noise and narrow lines; no hydrogen unless excluded pixels say so. */
export function meterOver(
  lines: readonly PlacedLight[],
  { sigma = 10, seed = 1, excludedNm = [] as readonly (readonly [number, number])[] } = {},
): PlaceMeter {
  const random = createRandom(seed);
  const wavelengthNm = Float64Array.from({ length: pixelCount }, (_, px) => 500 + px * pixelNm);
  const shape = (nm: number): number =>
    (Math.exp(-0.5 * (nm / gaussianSigmaNm) ** 2) * pixelNm) / (gaussianSigmaNm * Math.sqrt(2 * Math.PI));
  const netSignal = wavelengthNm.map(
    (nm) =>
      300 +
      0.8 * (nm - 500) +
      lines.reduce((sum, line) => sum + line.area * shape(nm - line.nm), 0) +
      sigma * random.normal(),
  );
  const recording: CorrectedRecording = {
    name: '',
    sha256: '',
    medium: 'air',
    wavelengthNm,
    edgeNm: Float64Array.from({ length: pixelCount + 1 }, (_, px) => 500 + (px - 0.5) * pixelNm),
    netSignal,
    clipped: new Uint8Array(pixelCount),
    clipLevel: null,
    noise: {
      fixedVariance: new Float64Array(pixelCount).fill(sigma * sigma),
      variancePerSignal: 0,
      signalReference: 'zero',
      origin: 'bench',
      correlation: [],
      runningMeanPoints: 1,
      gainElectronsPerCount: 1,
    },
    signalKind: 'per-pixel',
    darkUsed: 'offset',
    notes: [],
  };
  const excluded = Uint8Array.from(wavelengthNm, (nm) =>
    excludedNm.some(([from, to]) => from <= nm && nm <= to) ? 1 : 0,
  );
  const excludedBefore = new Int32Array(pixelCount + 1);
  for (const [px, flag] of excluded.entries()) excludedBefore[px + 1] = excludedBefore[px]! + flag;
  const hydrogen: HydrogenLight = {
    modelled: new Float64Array(pixelCount),
    baseline: new Float64Array(pixelCount),
    modelRun: new Uint8Array(pixelCount),
    excluded,
    excludedBefore,
  };
  return createPlaceMeter({ recording, hydrogen, fwhmNm, variancePerSignal: 0 });
}
