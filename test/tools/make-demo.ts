/**
 * Writes assets/demo: three invented recordings of lamp T-07 on bench 3, with dark, response table and bench file.
 * Run: node electron/launch/run-tool.mjs test/tools/make-demo.ts
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { exp } from '../../shared-core/numeric/portable-math.ts';
import { simulateDark, simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';

const folder = 'assets/demo';
mkdirSync(folder, { recursive: true });

const bench = {
  schema: 'lampwright.bench/1',
  name: 'Bench 3',
  lamp: { id: 'T-07', gas: 'H2', pressurePa: 300, pathLengthMm: 8, gasTemperatureK: 800 },
  supply: {
    openCircuitVolts: 5000,
    currentMilliamps: 10,
    capacitanceMicrofarads: 0.02,
    bleedResistanceMegohms: 10,
  },
  axis: { unit: 'nm', medium: 'air', sigmaNm: 0.02 },
  detector: { offsetCounts: 1000, gainElectronsPerCount: 5, readNoiseElectrons: 12, saturationCounts: 65535 },
  instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004 },
  dark: { file: 'dark-16x.csv' },
  response: { file: 'response.csv', per: 'photon', correlationLengthNm: 80 },
} as const;
writeFileSync(`${folder}/bench.json`, `${JSON.stringify(bench, null, 2)}\n`);

/** An invented grating spectrometer: best near 540 nm, weak towards the violet. */
const trueResponse = (nm: number): number => {
  const u = (nm - 540) / 130;
  return exp(-0.5 * u * u) * (1 + 0.04 * ((nm - 540) / 160));
};
/** What the calibration found: off by a smooth per cent or so, as its stated uncertainty allows. */
const tabulated = (nm: number): number => trueResponse(nm) * (1 + 0.008 * ((nm - 520) / 140));
const rows = ['wavelength_nm,response_relative,relative_standard_uncertainty'];
for (let nm = 370; nm <= 700; nm += 5)
  rows.push(`${String(nm)},${tabulated(nm).toPrecision(5)},${nm < 410 ? '0.025' : '0.015'}`);
writeFileSync(`${folder}/response.csv`, `${rows.join('\n')}\n`);

const benchForSimulation = { ...bench, axis: { medium: 'air', sigmaNm: 0.02 } } as const;
const recordedNm = (nm: number): number => nm + 0.42 + 0.0011 * (nm - 500);
const csv = (wavelengthNm: Float64Array, signal: Float64Array): string =>
  `Wavelength (nm),Signal (counts)\n${[...wavelengthNm].map((nm, i) => `${nm.toFixed(4)},${String(signal[i])}`).join('\n')}\n`;

const common = {
  bench: benchForSimulation,
  responseAt: trueResponse,
  recordedNm,
  continuumElectrons: 300,
};
const recordings = [
  {
    name: 't07-0411.csv',
    kelvin: 6200,
    electronsPerCubicMetre: 4e20,
    seed: 411,
    brightestPixelElectrons: 240_000,
  },
  {
    name: 't07-0412.csv',
    kelvin: 6150,
    electronsPerCubicMetre: 4e20,
    seed: 412,
    brightestPixelElectrons: 620_000,
  },
  {
    name: 't07-0413.csv',
    kelvin: 6100,
    electronsPerCubicMetre: 4e20,
    seed: 413,
    brightestPixelElectrons: 700,
  },
];
for (const { name, ...settings } of recordings) {
  const { wavelengthNm, signal } = simulateRecording({ ...common, ...settings });
  writeFileSync(`${folder}/${name}`, csv(wavelengthNm, signal));
}
const dark = simulateDark({ bench: benchForSimulation, seed: 400 });
writeFileSync(`${folder}/dark-16x.csv`, csv(dark.wavelengthNm.map(recordedNm), dark.signal));
