import { toRegisteredNm } from '../axis/axis-polynomial.ts';
import type { PeakSearch } from '../axis/find-peaks.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import { finalAxisMap } from '../diagnosis/registered-axis.ts';
import { identifyImpurities, type ImpurityFinding } from '../identify/identify-impurities.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { vacuumToAirNm } from '../physics/air-index.ts';
import { hydrogenLine } from '../physics/hydrogen.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';

/** Looks among the peaks that are no Balmer line for the marks of other gases, on the registered axis in air. */
export function findImpurities(input: {
  readonly recording: CorrectedRecording;
  readonly search: PeakSearch;
  readonly registration: AxisRegistration;
  readonly fits: LineFits;
  readonly lineTable: readonly SpectralLine[];
}): readonly ImpurityFinding[] {
  const { recording, search, registration, fits, lineTable } = input;
  const map = finalAxisMap(registration, fits);
  const inAir = (nm: number): number => (recording.medium === 'air' ? nm : vacuumToAirNm(nm));
  const registered = (nm: number): number => inAir(toRegisteredNm(map, nm));
  const n = recording.wavelengthNm.length;
  return identifyImpurities({
    peaks: search.peaks.map(({ recordedNm, signalToNoise }) => ({
      wavelengthNm: registered(recordedNm),
      wavelengthSigmaNm: Math.sqrt(
        (search.fwhmNm / 2.355 / signalToNoise) * (search.fwhmNm / 2.355 / signalToNoise) +
          fits.axisShift.offsetSigmaNm * fits.axisShift.offsetSigmaNm,
      ),
      signalToNoise,
    })),
    lineTable,
    fwhmNm: search.fwhmNm,
    rangeNm: [registered(recording.wavelengthNm[0]!), registered(recording.wavelengthNm[n - 1]!)],
    balmerLinesNm: [3, 4, 5, 6, 7, 8, 9, 10, 11, 12].map((level) => hydrogenLine(level).wavelengthAirNm),
  });
}
