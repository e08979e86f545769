import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';
import { shippedLineTable } from './line-table.ts';

const lineTable = shippedLineTable();

/** A hydrogen lamp with something else in it, diagnosed with the shipped table. */
export function impureLamp(seed: number, change: Partial<SimulationInput>): Diagnosis {
  const bench = change.bench ?? knownBench;
  const { wavelengthNm, signal } = simulateRecording({
    bench,
    kelvin: 6000,
    electronsPerCubicMetre: 1e20,
    seed,
    continuumElectrons: 40,
    brightestPixelElectrons: 240_000,
    rangeNm: [300, 900],
    ...change,
  });
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response: null,
    bench,
    options: defaultAnalysisOptions,
    lineTable,
    programVersion: '0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value.diagnosis;
}
