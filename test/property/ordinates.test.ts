import { expect, test } from 'vitest';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';

const kelvin = 6000;
const { wavelengthNm, signal } = simulateRecording({
  bench: knownBench,
  kelvin,
  electronsPerCubicMetre: 1e19,
  seed: 12,
  continuumElectrons: 20,
});
const flat = Float64Array.from([370, 700]);

function temperatureOf(
  values: Float64Array,
  bench: Parameters<typeof diagnose>[0]['bench'],
  response: Float64Array | null,
) {
  const result = diagnose({
    recording: asRecording(wavelengthNm, values),
    dark: null,
    response:
      response === null
        ? null
        : {
            name: 'r',
            sha256: '',
            wavelengthNm: flat,
            response,
            relativeSigma: Float64Array.from([0.001, 0.001]),
          },
    bench,
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  const { temperature, lines } = result.value.diagnosis;
  return { kelvin: temperature.kelvin!, sigma: temperature.sigmaKelvin!, lines };
}

const photon = temperatureOf(
  signal,
  { ...knownBench, response: { file: 'r', per: 'photon' } },
  Float64Array.from([1, 1]),
);

test('photon counts over a photon response give the truth', () => {
  expect(Math.abs(photon.kelvin - kelvin)).toBeLessThan(3 * photon.sigma);
});

test('a response per unit of energy and the same one per photon give the same temperature', () => {
  // Counts per joule = counts per photon times wavelength over hc: proportional to the wavelength.
  const energy = temperatureOf(
    signal,
    { ...knownBench, response: { file: 'r', per: 'energy' } },
    Float64Array.from([370, 700]),
  );
  expect(Math.abs(energy.kelvin - photon.kelvin)).toBeLessThan(0.02 * photon.sigma);
});

test('taking the one for the other is off by a thousand kelvins', () => {
  const mistaken = temperatureOf(
    signal,
    { ...knownBench, response: { file: 'r', per: 'energy' } },
    Float64Array.from([1, 1]),
  );
  // Photon data with the wavelength left in the ordinate: computed independently, 4236 K for 5000 K, 6209 K for 8000 K.
  expect(mistaken.kelvin).toBeGreaterThan(4500);
  expect(mistaken.kelvin).toBeLessThan(5200);
});

test('an irradiance per nanometre gives the same temperature, with the noise measured on the recording', () => {
  const step = wavelengthNm[1]! - wavelengthNm[0]!;
  const irradiance = signal.map((value, px) => (value - 1000) / step / wavelengthNm[px]!);
  const energy = temperatureOf(
    irradiance,
    { instrument: knownBench.instrument, detector: { signal: 'energy' } },
    null,
  );
  expect(Math.abs(energy.kelvin - photon.kelvin)).toBeLessThan(photon.sigma);
  for (const { areaUnit } of energy.lines) expect(areaUnit).toBe('signal nm');
  const alpha = energy.lines[0]!;
  expect(Math.abs((alpha.area! * 656.28 * 5) / photon.lines[0]!.area! - 1)).toBeLessThan(0.005);
});
