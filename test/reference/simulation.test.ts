import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { expectedElectrons } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';
import { projectRoot } from '../support/source-files.ts';

interface IndependentRecording {
  readonly seed: number;
  readonly response: 'flat' | 'bell';
  readonly kelvin: number;
  readonly perCubicMetre: number;
  readonly firstNm: number;
  readonly lastNm: number;
  readonly areaElectrons: Readonly<Record<string, number>>;
  readonly counts: readonly number[];
}

/** Made by test/tools/independent-recordings.py with SciPy and published tables; shares no code with the program. */
const data = JSON.parse(readFileSync(join(projectRoot, 'test/data/independent-recordings.json'), 'utf8')) as {
  readonly response: readonly (readonly [number, number])[];
  readonly recordings: readonly IndependentRecording[];
};

const axisOf = ({ firstNm, lastNm, counts }: IndependentRecording): Float64Array =>
  Float64Array.from(counts, (_, px) => firstNm + ((lastNm - firstNm) * px) / (counts.length - 1));

function diagnoseIndependent(recording: IndependentRecording) {
  const result = diagnose({
    recording: asRecording(axisOf(recording), Float64Array.from(recording.counts)),
    dark: null,
    response:
      recording.response === 'flat'
        ? null
        : {
            name: 'bell',
            sha256: '',
            wavelengthNm: Float64Array.from(data.response, ([nm]) => nm),
            response: Float64Array.from(data.response, ([, value]) => value),
            relativeSigma: new Float64Array(data.response.length).fill(0.003),
          },
    bench: { ...knownBench, response: { file: 'bell.csv', correlationLengthNm: 80 } },
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value.diagnosis;
}

describe.each(data.recordings)('recording $seed, made outside the program', (recording) => {
  const diagnosis = diagnoseIndependent(recording);

  test('temperature within three sigma of the truth, and the verdict agrees with what is known', () => {
    const { kelvin, sigmaKelvin, status } = diagnosis.temperature;
    expect(status).toBe('measured');
    expect(Math.abs(kelvin! - recording.kelvin)).toBeLessThan(3 * sigmaKelvin!);
    // Three sigma must mean something: no interval here is wider than a tenth of the temperature.
    expect(sigmaKelvin! / kelvin!).toBeLessThan(0.05);
    expect(diagnosis.verdict).toBe(recording.response === 'bell' ? 'sound' : 'use with care');
  });

  test('every area within four sigma of the electrons that were put in', () => {
    expect(diagnosis.lines).toHaveLength(5);
    for (const { id, area, areaSigma } of diagnosis.lines) {
      const pull = (area! - recording.areaElectrons[id]!) / areaSigma!;
      expect(Math.abs(pull), `${id}: ${String(pull)}`).toBeLessThan(4);
    }
  });

  test('density inside its interval, or below its limit', () => {
    const { status, lowPerCubicMetre, highPerCubicMetre } = diagnosis.electronDensity;
    expect(status).toBe(recording.perCubicMetre >= 1e20 ? 'measured' : 'upper-limit');
    expect(highPerCubicMetre!).toBeGreaterThan(recording.perCubicMetre);
    if (status === 'measured') expect(lowPerCubicMetre!).toBeLessThan(recording.perCubicMetre);
  });
});

test('the simulator puts the same electrons into the same lines as the independent program', () => {
  const recording = data.recordings[1]!;
  const { electrons, areas } = expectedElectrons(
    {
      bench: knownBench,
      kelvin: recording.kelvin,
      electronsPerCubicMetre: recording.perCubicMetre,
      seed: 0,
      brightestPixelElectrons: 1.5e5,
    },
    axisOf(recording),
  );
  for (const [id, area] of Object.entries(recording.areaElectrons)) {
    // Tables are printed to five digits, wavelengths to 0.1 pm; a Stark ratio of 2.22 against the scaling law's value.
    expect(Math.abs(areas.get(id)! / area - 1), id).toBeLessThan(2e-3);
  }
  const gain = knownBench.detector!.gainElectronsPerCount!;
  const offset = knownBench.detector!.offsetCounts!;
  const axis = axisOf(recording);
  let chiSquare = 0;
  let compared = 0;
  for (const [px, count] of recording.counts.entries()) {
    // Below lie the higher Balmer lines, which only the simulator puts in.
    if (axis[px]! < 393) continue;
    compared++;
    const mean = electrons[px]! + 60;
    const sigma = Math.sqrt(mean + 144 + (gain * gain) / 12);
    chiSquare += (((count - offset) * gain - mean) / sigma) ** 2;
  }
  // Chi-square of so many pixels has twice as much variance.
  expect(compared).toBeGreaterThan(3000);
  expect(Math.abs(chiSquare - compared)).toBeLessThan(5 * Math.sqrt(2 * compared));
});
