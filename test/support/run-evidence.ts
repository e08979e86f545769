import type { Bench } from '../../shared-core/bench/bench.ts';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import type { Evidence } from '../../shared-core/diagnosis/evidence.ts';
import type { AnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import { diagnose } from '../../shared-core/pipeline/diagnose.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';

/** Flat from 360 to 710 nm, one per cent. */
export const flatTable: ResponseTable = Object.freeze({
  name: 'flat.csv',
  sha256: 'ab',
  wavelengthNm: Float64Array.from([360, 710]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([0.01, 0.01]),
});

export interface Run {
  readonly simulation?: Partial<SimulationInput>;
  readonly bench?: Partial<Bench>;
  readonly options?: Partial<AnalysisOptions>;
  readonly response?: ResponseTable | null;
}

/** Simulates a careful user's recording and diagnoses it; `bench` is laid over a fully described one. */
export function runDiagnosis({ simulation, bench, options, response = flatTable }: Run = {}): {
  readonly diagnosis: Diagnosis;
  readonly evidence: Evidence;
} {
  const full: Bench = { ...knownBench, response: { file: 'flat.csv', correlationLengthNm: 80 }, ...bench };
  const { wavelengthNm, signal } = simulateRecording({
    bench: full,
    kelvin: 6300,
    electronsPerCubicMetre: 3e20,
    continuumElectrons: 40,
    seed: 2,
    ...simulation,
  });
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response,
    bench: full,
    options: { leftOut: [], ...options },
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}

export const checkOf = ({ checks }: Diagnosis, id: string) => checks.find((check) => check.id === id);
