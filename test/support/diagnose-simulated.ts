import type { Bench } from '../../shared-core/bench/bench.ts';
import {
  defaultAnalysisOptions,
  diagnose,
  type DiagnoseOutput,
} from '../../shared-core/pipeline/diagnose.ts';
import { plainTable } from '../../shared-core/recording/make-recording.ts';
import type { Recording, ResponseTable } from '../../shared-core/recording/recording.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';

/** The bench of the coverage tests: everything known, as a careful user would state it. */
export const knownBench: Bench = Object.freeze({
  detector: { offsetCounts: 1000, gainElectronsPerCount: 5, readNoiseElectrons: 12, saturationCounts: 65535 },
  instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004 },
});

/** A recording that never was a file. */
export function asRecording(wavelengthNm: Float64Array, signal: Float64Array): Recording {
  return {
    name: 'simulated.csv',
    sha256: '',
    wavelengthNm,
    signal,
    medium: 'air',
    understood: plainTable,
    notes: [],
  };
}

/** Simulates and diagnoses; throws when the chain refuses, which none of these recordings gives it cause to. */
export function diagnoseSimulated(
  input: SimulationInput,
  response: ResponseTable | null = null,
  bench: Bench = input.bench,
): DiagnoseOutput {
  const { wavelengthNm, signal } = simulateRecording(input);
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response,
    bench,
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(JSON.stringify(result.problem));
  return result.value;
}
