import type { Bench } from './bench.ts';

/** A bench that nobody has described: everything is taken from the recording or left open. */
export const defaultBench: Bench = Object.freeze({});

/** A bench file with every field, for the manual and as a start to edit. */
export const benchTemplate = Object.freeze({
  schema: 'lampwright.bench/1',
  name: 'Bench 3',
  lamp: { id: 'T-07', gas: 'H2', pressurePa: 300, pathLengthMm: 8, gasTemperatureK: 800 },
  supply: {
    openCircuitVolts: 5000,
    currentMilliamps: 10,
    capacitanceMicrofarads: 0.02,
    bleedResistanceMegohms: 10,
  },
  axis: { unit: 'nm', medium: 'air', coefficientsNm: [380, 0.0912], sigmaNm: 0.02 },
  detector: {
    signal: 'counts',
    offsetCounts: 1000,
    gainElectronsPerCount: 5,
    readNoiseElectrons: 12,
    saturationCounts: 65_535,
  },
  instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004, lorentzShare: 0, profileFile: 'reference-lamp.csv' },
  dark: { file: 'dark.csv' },
  response: {
    file: 'response.csv',
    per: 'photon',
    correlationLengthNm: 80,
    lamp: { temperatureK: 2856, sigmaK: 10 },
    strayLight: { share: 0, sigma: 2e-4 },
  },
  mirror: { file: 'with-mirror.csv' },
  absorption: { sourceFile: 'source.csv', throughFile: 'source-through-lamp.csv' },
  analysis: {
    upperLevels: [3, 4, 5, 6, 7],
    deuterium: 'auto',
    fit: 'joint',
    coverage: 0.95,
    widening: 'none',
    selfAbsorption: 'report',
    levels: 'all',
  },
} satisfies Bench);
