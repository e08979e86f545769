import { findPeaks } from '../../shared-core/axis/find-peaks.ts';
import { registerAxis } from '../../shared-core/axis/register-axis.ts';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { fitLines } from '../../shared-core/lines/fit-lines.ts';
import type { LineFits } from '../../shared-core/lines/line-fit.ts';
import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';

/** Simulates a recording and takes it as far as the line fits. */
export function fitSimulated(
  simulation: Partial<SimulationInput>,
  bench: Bench = knownBench,
  upperLevels: readonly number[] = [3, 4, 5, 6, 7],
): LineFits {
  const { wavelengthNm, signal } = simulateRecording({
    bench,
    kelvin: 6000,
    electronsPerCubicMetre: 1e19,
    seed: 1,
    ...simulation,
  });
  const corrected = correctRecording(asRecording(wavelengthNm, signal), null, bench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  const recording = corrected.value;
  const lines = upperLevels.map((level) => hydrogenLine(level));
  const search = findPeaks(recording, bench.instrument?.fwhmNm ?? null);
  const registration = registerAxis(
    search.peaks,
    lines.map(({ id, wavelengthAirNm }) => ({ id, referenceNm: wavelengthAirNm })),
    { firstNm: wavelengthNm[0]!, lastNm: wavelengthNm.at(-1)!, fwhmNm: search.fwhmNm },
  );
  if (registration.status !== 'registered') throw new Error(registration.status);
  return fitLines({ recording, registration, search, lines, bench });
}
