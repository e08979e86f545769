import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { exp } from '../../shared-core/numeric/portable-math.ts';
import { caseB } from '../../shared-core/physics/case-b.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import {
  defaultAnalysisOptions,
  diagnose,
  type DiagnoseOutput,
} from '../../shared-core/pipeline/diagnose.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import type { SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { rate } from './rate.ts';
import { asRecording, diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

/** A way to be fooled: how often it happens, and how often it may. */
export interface Trap {
  readonly name: string;
  readonly allowed: string;
  /** Whether the draw with this number fell into it. */
  readonly isCaught: (index: number) => boolean;
}

/** The table the program ships; read from the project's folder, where npm runs its scripts. */
const lineTable = (() => {
  const table = readLineTable(readFileSync(join('assets', 'lines', 'lines.csv'), 'utf8'));
  if (!table.ok) throw new Error(table.problem.found);
  return table.value;
})();

/** A response known to 1 %: without one no bend of the plot could be told from the spectrometer's. */
const response: ResponseTable = {
  name: 'response.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([300, 1000]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([0.01, 0.01]),
};

const lamp = (seed: number, input: Partial<SimulationInput>): DiagnoseOutput =>
  diagnoseSimulated(
    {
      bench: knownBench,
      kelvin: 6000,
      electronsPerCubicMetre: 1e18,
      seed,
      brightestPixelElectrons: 240_000,
      continuumElectrons: 20,
      ...input,
    },
    response,
  );

const boltzmann = (level: number, kelvin: number): number =>
  exp((hydrogenLine(3).upperEnergyEv - hydrogenLine(level).upperEnergyEv) / (boltzmannEvPerK * kelvin));

export const traps: readonly Trap[] = [
  {
    name: 'two temperatures (3000 and 12000 K) called sound',
    allowed: 'at most 5 %',
    isCaught: (index) =>
      lamp(71_000 + index, {
        populationOf: (level) => 0.8 * boltzmann(level, 3000) + 0.2 * boltzmann(level, 12_000),
      }).diagnosis.verdict === 'sound',
  },
  {
    name: 'H-alpha with optical depth 3 not flagged',
    allowed: 'at most 5 %',
    isCaught: (index) =>
      lamp(72_000 + index, { hAlphaOpticalDepth: 3 }).diagnosis.selfAbsorption.status !== 'suspected',
  },
  {
    name: 'thin H-alpha flagged',
    allowed: 'about 1 %',
    isCaught: (index) => lamp(73_000 + index, {}).diagnosis.selfAbsorption.status === 'suspected',
  },
  {
    name: 'recombining gas (case B) called an electron temperature',
    allowed: 'never',
    isCaught: (index) =>
      lamp(74_000 + index, { populationOf: caseBPopulation }).diagnosis.meaning.kind ===
      'electron-temperature',
  },
  {
    name: 'a temperature from noise without any line',
    allowed: 'never',
    isCaught: (index) => withoutLines(75_000 + index).diagnosis.temperature.status !== 'not-determined',
  },
  {
    name: 'a species claimed in a pure hydrogen lamp',
    allowed: 'at most 1 %',
    isCaught: (index) => pureHydrogen(76_000 + index).diagnosis.impurities.length > 0,
  },
];

const lowDensityCaseB = caseB.find(
  ({ kelvin, electronsPerCubicMetre }) => kelvin === 10_000 && electronsPerCubicMetre < 1e12,
)!;

/** Populations per sublevel of the recombining gas of the published table, from its Balmer ratios in energy. */
function caseBPopulation(level: number): number {
  const { ratios } = lowDensityCaseB;
  const line = hydrogenLine(level);
  const photons = (ratios[level - 3] ?? 0) * line.wavelengthVacuumNm;
  return photons / (line.upperWeight * line.transitionProbabilityPerS);
}

function withoutLines(seed: number): DiagnoseOutput {
  const random = createRandom(seed);
  const wavelengthNm = Float64Array.from({ length: 3648 }, (_, i) => 370 + (330 * i) / 3647);
  const signal = wavelengthNm.map(() => Math.round(1000 + (random.poisson(60) + 12 * random.normal()) / 5));
  return run(wavelengthNm, signal);
}

function pureHydrogen(seed: number): DiagnoseOutput {
  const { evidence } = lamp(seed, { rangeNm: [300, 900] });
  return run(
    evidence.recording.wavelengthNm,
    evidence.recording.netSignal.map((value) => value + 1000),
  );
}

function run(wavelengthNm: Float64Array, signal: Float64Array): DiagnoseOutput {
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response,
    bench: knownBench,
    options: defaultAnalysisOptions,
    lineTable,
    programVersion: '0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}

/** Rates with their binomial errors. */
export function trapTable(drawCount: number): string[][] {
  return [
    ['trap', 'allowed', 'caught', 'rate'],
    ...traps.map(({ name, allowed, isCaught }) => {
      let caught = 0;
      for (let index = 0; index < drawCount; index++) if (isCaught(index)) caught++;
      return [name, allowed, `${String(caught)} of ${String(drawCount)}`, rate(caught, drawCount)];
    }),
  ];
}
