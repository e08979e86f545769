import { toRecordedNm, toRegisteredNm } from '../axis/axis-polynomial.ts';
import type { PeakSearch } from '../axis/find-peaks.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import { finalAxisMap } from '../diagnosis/registered-axis.ts';
import { hydrogenLight, type HydrogenPlace } from '../identify/hydrogen-light.ts';
import { identify, type Identification } from '../identify/identify.ts';
import type { AxisInAir } from '../identify/measure-feature.ts';
import { createPlaceMeter } from '../identify/place-meter.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { airToVacuumNm, vacuumToAirNm } from '../physics/air-index.ts';
import { seriesLine, type HydrogenLine } from '../physics/hydrogen.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';

/** Balmer lines to n = 16 and Paschen lines to n = 14 are never taken for something else. */
const hydrogenLines: readonly HydrogenLine[] = [
  ...Array.from({ length: 14 }, (_, index) => seriesLine(index + 3, 2)),
  ...Array.from({ length: 10 }, (_, index) => seriesLine(index + 5, 3)),
];

/** What a distance from the lines that settle the axis adds to its uncertainty: a share of the line width. */
const axisBowWidths = 0.05;
const axisBowNm = 50;

/** Looks in a registered recording for the light of anything but hydrogen atoms. */
export function findImpurities(input: {
  readonly recording: CorrectedRecording;
  readonly search: PeakSearch;
  readonly registration: AxisRegistration;
  readonly fits: LineFits;
  readonly lineTable: readonly SpectralLine[];
}): Identification {
  const { recording, search, registration, fits, lineTable } = input;
  const map = finalAxisMap(registration, fits);
  const isAir = recording.medium === 'air';
  const recordedNm = (nm: number): number => toRecordedNm(map, isAir ? nm : airToVacuumNm(nm));
  const airNm = (nm: number): number =>
    isAir ? toRegisteredNm(map, nm) : vacuumToAirNm(toRegisteredNm(map, nm));
  const fwhmNm = narrowLineWidthNm(recording, search, fits);
  const places: readonly HydrogenPlace[] = hydrogenLines.map(({ id, upperLevel, wavelengthAirNm }) => ({
    id,
    upperLevel,
    recordedNm: recordedNm(wavelengthAirNm),
  }));
  return identify({
    meter: createPlaceMeter({
      recording,
      hydrogen: hydrogenLight(recording, fits, places, fwhmNm),
      fwhmNm,
      variancePerSignal: Math.max(recording.noise.variancePerSignal, fits.variancePerSignal),
    }),
    axis: { recordedNm, sigmaNm: axisSigma(registration, fits, fwhmNm) },
    airNm,
    peaksNm: [...search.peaks, ...search.fainter].map((peak) => peak.recordedNm),
    underHydrogen: fits.companions.map(({ species, referenceNm, area, areaSigma }) => ({
      name: species,
      airNm: isAir ? referenceNm : vacuumToAirNm(referenceNm),
      area,
      areaSigma,
    })),
    lineTable,
  });
}

/** Instrument with pixel where the bench states it, else the strongest line's width, which Stark and Doppler widen. */
function narrowLineWidthNm({ wavelengthNm }: CorrectedRecording, search: PeakSearch, fits: LineFits): number {
  const { instrumentFwhmNm, instrumentFwhmSigmaNm } = fits;
  if (!(instrumentFwhmNm > 3 * instrumentFwhmSigmaNm)) return search.fwhmNm;
  const n = wavelengthNm.length;
  const pixelNm = (wavelengthNm[n - 1]! - wavelengthNm[0]!) / (n - 1);
  // A pixel widens a Gaussian by its variance, pixel^2/12; 8 ln 2/12 = 0.462.
  const recorded = Math.sqrt(instrumentFwhmNm * instrumentFwhmNm + 0.462 * pixelNm * pixelNm);
  return Math.min(search.fwhmNm, Math.max(1.2 * pixelNm, recorded));
}

function axisSigma(
  { matched, map }: AxisRegistration,
  { axisShift }: LineFits,
  fwhmNm: number,
): AxisInAir['sigmaNm'] {
  let low = Infinity;
  let high = -Infinity;
  for (const { referenceNm } of matched) {
    low = Math.min(low, referenceNm);
    high = Math.max(high, referenceNm);
  }
  return (nm) => {
    const beyond = Math.max(0, low - nm, nm - high) / axisBowNm;
    const stretch = axisShift.stretchSigma * (nm - map.pivotNm);
    const bow = axisBowWidths * fwhmNm * (1 + beyond);
    return Math.sqrt(axisShift.offsetSigmaNm * axisShift.offsetSigmaNm + stretch * stretch + bow * bow);
  };
}
