import { describe, expect, test } from 'vitest';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { diagnose, type DiagnoseInput } from '../../../shared-core/pipeline/diagnose.ts';
import {
  simulateRecording,
  type SimulationInput,
} from '../../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../../support/diagnose-simulated.ts';

const flatTable = {
  name: 'flat.csv',
  sha256: 'ab',
  wavelengthNm: Float64Array.from([360, 710]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([0.01, 0.01]),
};

function run(simulation: Partial<SimulationInput> = {}, change: Partial<DiagnoseInput> = {}): Diagnosis {
  const { wavelengthNm, signal } = simulateRecording({
    bench: knownBench,
    kelvin: 6300,
    electronsPerCubicMetre: 3e20,
    continuumElectrons: 40,
    seed: 2,
    ...simulation,
  });
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response: flatTable,
    bench: { ...knownBench, response: { file: 'flat.csv', correlationLengthNm: 80 } },
    options: { leftOut: [] },
    lineTable: [],
    programVersion: '0.0.0',
    ...change,
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value.diagnosis;
}
const check = (diagnosis: Diagnosis, id: string) =>
  diagnosis.checks.find((candidate) => candidate.id === id)!;

const good = run();

test('a good recording: every check sound, verdict sound, and nothing to do', () => {
  expect(good.checks.map(({ verdict }) => verdict)).toEqual(good.checks.map(() => 'sound'));
  expect(good.verdict).toBe('sound');
  expect(good.verdictText).toBe('All checks are sound.');
  expect(good.checks.map(({ id }) => id).sort()).toEqual(
    [
      'axis-shift',
      'blends',
      'clipping',
      'density-detectable',
      'energy-span',
      'line-significance',
      'noise',
      'partial-equilibrium',
      'population-straightness',
      'profile-fit',
      'response',
      'sampling',
      'self-absorption',
      'single-line-influence',
    ].sort(),
  );
});

describe('each check where it must not be sound', () => {
  test('clipping: a line lost to the ceiling is named with the level', () => {
    const found = check(run({ brightestPixelElectrons: 600_000 }), 'clipping');
    expect(found.verdict).toBe('use with care');
    expect(found.facts['clippedLines']).toBe('H-alpha');
    expect(found.text).toContain('65535');
  });

  test('sampling: fewer than one and a half pixels a width', () => {
    const bench = { ...knownBench, instrument: { fwhmNm: 0.04, fwhmSigmaNm: 0.002 } };
    const found = check(run({ bench }, { bench }), 'sampling');
    expect(found.verdict).toBe('use with care');
    expect(Number(found.facts['pixelsPerWidth'])).toBeLessThan(1.5);
  });

  test('noise: a smoothed export', () => {
    const { wavelengthNm, signal } = simulateRecording({
      bench: knownBench,
      kelvin: 6300,
      electronsPerCubicMetre: 3e20,
      seed: 2,
    });
    const smooth = signal.map((_, i) => ((signal[i - 1] ?? 1000) + signal[i]! + (signal[i + 1] ?? 1000)) / 3);
    const found = check(run({}, { recording: asRecording(wavelengthNm, smooth) }), 'noise');
    expect(found.verdict).toBe('use with care');
    expect(found.facts['correlated']).toBe(true);
  });

  test('line-significance: two lines are care, none is not defensible', () => {
    const two = check(
      run({ brightestPixelElectrons: 3000, kelvin: 3000, electronsPerCubicMetre: 1e18 }),
      'line-significance',
    );
    expect(two.verdict).toBe('use with care');
    expect(two.facts['strongLineCount']).toBe(2);
    const none = run({ brightestPixelElectrons: 30 });
    expect(check(none, 'line-significance').verdict).toBe('not defensible');
    expect(none.temperature.status).toBe('not-determined');
  });

  test('axis-shift: no pattern, not defensible; a shift with three lines is told and corrected', () => {
    expect(check(run({ brightestPixelElectrons: 30 }), 'axis-shift').verdict).toBe('not defensible');
    const shifted = check(run({ recordedNm: (nm) => nm - 2.5 }), 'axis-shift');
    expect(shifted.verdict).toBe('sound');
    expect(shifted.facts['shiftNm']).toBeCloseTo(-2.5, 2);
    expect(shifted.remedy).toContain('reference lamp');
  });

  test('profile-fit: lines of different widths', () => {
    const { wavelengthNm, signal } = simulateRecording({
      bench: knownBench,
      kelvin: 6300,
      electronsPerCubicMetre: 1e19,
      seed: 2,
    });
    const smeared = signal.map((value, i) =>
      wavelengthNm[i]! > 450
        ? value
        : Math.round(0.25 * signal[Math.max(0, i - 1)]! + 0.5 * value + 0.25 * signal[i + 1]!),
    );
    const found = check(run({}, { recording: asRecording(wavelengthNm, smeared) }), 'profile-fit');
    expect(found.verdict).toBe('use with care');
  });

  test('blends: a line under H-gamma is fitted with it, one beside it is masked', () => {
    const under = run({
      extraLines: [{ wavelengthNm: 433.922, relativeArea: 0.01 }],
      electronsPerCubicMetre: 1e18,
    });
    expect(check(under, 'blends').facts['fitted']).toBe('Hg I under H-gamma');
    expect(check(under, 'blends').text).toContain('433.922 nm');
    expect(Math.abs(under.lines[2]!.area! / good.lines[2]!.area! - 1)).toBeLessThan(0.15);
    const beside = run({
      extraLines: [{ wavelengthNm: 433.35, relativeArea: 0.02 }],
      electronsPerCubicMetre: 1e18,
    });
    expect(check(beside, 'blends').verdict).toBe('sound');
    expect(beside.lines[2]!.used).toBe(true);
    expect(Math.abs(beside.lines[2]!.area! / good.lines[2]!.area! - 1)).toBeLessThan(0.15);
  });

  test('response: none, none stated, and the temperature says so', () => {
    const none = run({}, { response: null });
    expect(check(none, 'response').verdict).toBe('use with care');
    expect(none.temperature.responseCorrected).toBe(false);
    expect(none.verdict).toBe('use with care');
    const silent = run({}, { response: { ...flatTable, relativeSigma: null } });
    expect(check(silent, 'response').verdict).toBe('use with care');
    expect(check(silent, 'response').text).toContain('4 %');
  });

  test('energy-span and influence: with H-alpha left out the span falls', () => {
    const found = run({}, { options: { leftOut: ['H-alpha'] } });
    expect(check(found, 'energy-span').verdict).toBe('use with care');
    expect(Number(check(found, 'energy-span').facts['spanEv'])).toBeCloseTo(13.3209 - 12.7485, 3);
    expect(found.lines[0]!.reasons).toEqual(['switched off by hand']);
    expect(found.options.leftOut).toEqual(['H-alpha']);
    const two = run({}, { options: { leftOut: ['H-gamma', 'H-delta', 'H-epsilon'] } });
    expect(check(two, 'single-line-influence').verdict).toBe('use with care');
    expect(check(two, 'population-straightness').text).toContain('Two lines always lie on a straight line');
  });

  test('population-straightness: one line half as bright again as the rest demand', () => {
    const bent = run({ responseAt: (nm) => (nm < 450 && nm > 420 ? 1.5 : 1) });
    expect(check(bent, 'population-straightness').verdict).toBe('not defensible');
    expect(bent.verdict).toBe('not defensible');
    const pull = check(bent, 'single-line-influence');
    expect(pull.verdict).toBe('use with care');
    expect(pull.facts['lineId']).toBe('H-gamma');
  });

  test('density-detectable: hidden by the instrument is a limit, and no fault', () => {
    const found = run({ electronsPerCubicMetre: 1e17 });
    expect(found.electronDensity.status).toBe('upper-limit');
    expect(found.electronDensity.perCubicMetre).toBeNull();
    expect(check(found, 'density-detectable').verdict).toBe('sound');
  });
});

describe('meaning', () => {
  test('is the electron temperature only where a measured density shows the levels in equilibrium', () => {
    expect(good.meaning.kind).toBe('electron-temperature');
    expect(good.meaning.lowestEquilibratedLevel).toBe(3);
    const thin = run({ electronsPerCubicMetre: 1e17 });
    expect(thin.meaning.kind).toBe('distribution-temperature');
    expect(thin.meaning.lowestEquilibratedLevel).toBeNull();
    expect(thin.meaning.text).toContain('recombining gas');
  });
});

describe('limits of the temperature', () => {
  test('populations as flat as an infinite temperature give a lower limit and no value', () => {
    const { temperature, verdict } = run({
      kelvin: 200_000,
      brightestPixelElectrons: 500,
      electronsPerCubicMetre: 1e18,
    });
    expect(temperature.status).toBe('lower-limit');
    expect(temperature.kelvin).toBeNull();
    expect(temperature.highKelvin).toBeNull();
    expect(temperature.lowKelvin!).toBeGreaterThan(5000);
    expect(temperature.lowKelvin!).toBeLessThan(200_000);
    expect(verdict).not.toBe('sound');
  });

  test('populations that rise with energy have no temperature, and the reason says where to look', () => {
    const { temperature, verdict } = run({ responseAt: (nm) => (nm > 600 ? 0.02 : 1) });
    expect(temperature.status).toBe('not-determined');
    expect(temperature.text).toContain('rise with energy');
    expect(verdict).toBe('not defensible');
  });
});

describe('budget', () => {
  test('shares add up to one, largest first, and the parts to the whole', () => {
    const { budget, temperature } = good;
    expect(budget.map(({ source }) => source)).toContain('spectral response');
    expect(budget.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 9);
    const squares = budget.reduce((sum, { sigmaKelvin }) => sum + sigmaKelvin ** 2, 0);
    expect(Math.sqrt(squares) / temperature.sigmaKelvin!).toBeCloseTo(1, 9);
    for (const [index, { share }] of budget.slice(1).entries())
      expect(share).toBeLessThanOrEqual(budget[index]!.share);
  });

  test('states what each component does to the areas, and the degrees of freedom of noise that was measured', () => {
    const response = good.budget.find(({ source }) => source === 'spectral response')!;
    expect(response).toMatchObject({ smallestRelative: 0.01, largestRelative: 0.01, degreesOfFreedom: null });
    expect(good.temperature.effectiveDegreesOfFreedom).toBeNull();
    const { gainElectronsPerCount: _gain, readNoiseElectrons: _noise, ...detector } = knownBench.detector!;
    const unknown = run({}, { bench: { ...knownBench, detector } });
    const noise = unknown.budget.find(({ source }) => source.startsWith('noise'))!;
    expect(noise.degreesOfFreedom).toBeGreaterThan(50);
    expect(noise.largestRelative).toBeGreaterThan(noise.smallestRelative);
    const freedom = unknown.temperature.effectiveDegreesOfFreedom!;
    // Welch and Satterthwaite with one finite part: nu / share^2.
    expect((freedom * noise.share ** 2) / noise.degreesOfFreedom!).toBeCloseTo(1, 9);
  });

  test('halving the response uncertainty brings what its remedy promises', () => {
    const row = good.budget.find(({ source }) => source === 'spectral response')!;
    const better = run({}, { response: { ...flatTable, relativeSigma: Float64Array.from([0.005, 0.005]) } });
    const promised = Number(/becomes ([\d.]+) K/.exec(row.remedy)![1]);
    // The promise is printed to two digits.
    expect(Math.abs(better.temperature.sigmaKelvin! / promised - 1)).toBeLessThan(0.08);
  });

  test('the response part is the scatter that drawn response errors cause', () => {
    const row = good.budget.find(({ source }) => source === 'spectral response')!;
    // One common tilt of one sigma at either end moves T by less than the whole part, and by more than a tenth of it.
    const tilted = run({}, { response: { ...flatTable, response: Float64Array.from([0.99, 1.01]) } });
    const move = Math.abs(tilted.temperature.kelvin! - good.temperature.kelvin!);
    expect(move).toBeGreaterThan(0.3 * row.sigmaKelvin);
    expect(move).toBeLessThan(3 * row.sigmaKelvin);
  });
});
