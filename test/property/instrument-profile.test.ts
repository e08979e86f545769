import { describe, expect, test } from 'vitest';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import type { Recording } from '../../shared-core/recording/recording.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';
import { pseudoVoigt, referenceLamp, slit } from '../support/reference-lamp.ts';

const kelvin = 7000;
const electronsPerCubicMetre = 1e21;
const drawCount = 40;
const detectorOnly: Bench = { detector: knownBench.detector };

function diagnosed(recording: Recording, profile: Recording | null, bench: Bench) {
  const result = diagnose({
    recording,
    dark: null,
    response: null,
    profile,
    bench,
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value.diagnosis;
}

/** Deviation of the density from the truth, in standard deviations. */
function densityPull({ electronDensity }: ReturnType<typeof diagnosed>): number {
  const { perCubicMetre, lowPerCubicMetre, highPerCubicMetre } = electronDensity;
  const sigma = Math.log(highPerCubicMetre! / lowPerCubicMetre!) / (2 * 1.959964);
  return Math.log(perCubicMetre! / electronsPerCubicMetre) / sigma;
}
const isCovered = ({ temperature: { lowKelvin, highKelvin } }: ReturnType<typeof diagnosed>): boolean =>
  lowKelvin! <= kelvin && kelvin <= highKelvin!;

describe('an instrument measured on a reference lamp', () => {
  test('with Lorentz wings: the wings are not taken for Stark width, which they are where only a width is stated', () => {
    const shape = { fwhmNm: 0.2, lorentzShare: 0.4 };
    const withLamp: ReturnType<typeof diagnosed>[] = [];
    const stated: ReturnType<typeof diagnosed>[] = [];
    for (let seed = 0; seed < drawCount; seed++) {
      const { wavelengthNm, signal } = simulateRecording({
        bench: { ...knownBench, instrument: shape },
        kelvin,
        electronsPerCubicMetre,
        seed: 91_000 + seed,
        continuumElectrons: 20,
        brightestPixelElectrons: 240_000,
      });
      const recording = asRecording(wavelengthNm, signal);
      const lamp = referenceLamp(() => pseudoVoigt(shape.fwhmNm, shape.lorentzShare), { seed });
      withLamp.push(diagnosed(recording, lamp, detectorOnly));
      stated.push(
        diagnosed(recording, null, { ...detectorOnly, instrument: { fwhmNm: 0.2, fwhmSigmaNm: 0.004 } }),
      );
    }
    const [first] = withLamp;
    expect(first!.instrumentProfile).toMatchObject({ status: 'measured', shape: 'pseudo-voigt' });
    expect(first!.inputs.profile!.name).toBe('reference-lamp.csv');
    const mean = (all: readonly ReturnType<typeof diagnosed>[]): number =>
      all.map(densityPull).reduce((sum, pull) => sum + pull, 0) / all.length;
    expect(Math.abs(mean(withLamp))).toBeLessThan(0.4);
    expect(mean(stated)).toBeGreaterThan(1);
    // 33 of 40 and fewer have a chance of 1 in 200 at 95 %.
    expect(withLamp.filter(isCovered).length).toBeGreaterThanOrEqual(34);
  });

  test('behind a wide slit: temperature and density are those of the tube', () => {
    const [widthNm, opticsNm] = [0.35, 0.12];
    const shiftCount = 24;
    let signal: Float64Array | null = null;
    let wavelengthNm: Float64Array = new Float64Array();
    for (let k = 0; k < shiftCount; k++) {
      const shift = widthNm * ((k + 0.5) / shiftCount - 0.5);
      const part = simulateRecording({
        bench: { ...knownBench, instrument: { fwhmNm: opticsNm } },
        kelvin,
        electronsPerCubicMetre,
        seed: 92_000 + k,
        continuumElectrons: 20,
        brightestPixelElectrons: 240_000,
        recordedNm: (nm) => nm + shift,
      });
      wavelengthNm = part.wavelengthNm;
      signal = part.signal.map((value, px) => value / shiftCount + (signal?.[px] ?? 0));
    }
    const lamp = referenceLamp(() => slit(widthNm, opticsNm));
    const found = diagnosed(asRecording(wavelengthNm, signal!), lamp, detectorOnly);
    expect(found.instrumentProfile!.shape).toBe('tabulated');
    expect(isCovered(found)).toBe(true);
    expect(Math.abs(densityPull(found))).toBeLessThan(2);
  });

  test('a lamp that shows no line changes nothing, and says what to do', () => {
    const { wavelengthNm, signal } = simulateRecording({
      bench: knownBench,
      kelvin,
      electronsPerCubicMetre,
      seed: 5,
    });
    const recording = asRecording(wavelengthNm, signal);
    const dark = referenceLamp(() => () => 0, { brightestElectrons: 0 });
    const found = diagnosed(recording, dark, knownBench);
    expect(found.instrumentProfile!.status).toBe('not-measured');
    expect(found.instrumentProfile!.text).toMatch(/lamp with sharp lines/);
    expect(found.temperature).toEqual(diagnosed(recording, null, knownBench).temperature);
  });
});
