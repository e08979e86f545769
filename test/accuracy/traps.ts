import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { exp } from '../../shared-core/numeric/portable-math.ts';
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

/** How much of level 3 belongs to the cooler of two distributions; the hotter one has 12 000 K. */
const coolShares = [0.2, 0.5, 0.9, 0.95, 0.97] as const;
/** Bright, and so faint that the deficit of H-alpha is about five sigma. */
const lights = [240_000, 8000] as const;

/** Ratios of a recombining gas at the densities of discharge tubes and below, and their source. */
const recombination = JSON.parse(readFileSync(join('test', 'data', 'case-b-balmer.json'), 'utf8')) as {
  readonly rows: readonly {
    readonly kelvin: number;
    readonly electronsPerCubicCentimetre: number;
    readonly ratios: readonly number[];
  }[];
};

export const traps: readonly Trap[] = [
  {
    name: 'two temperatures (3000 and 12000 K) called sound',
    allowed: 'at most 5 %',
    isCaught(index) {
      const cool = coolShares[index % coolShares.length]!;
      const populationOf = (level: number): number =>
        cool * boltzmann(level, 3000) + (1 - cool) * boltzmann(level, 12_000);
      return lamp(71_000 + index, { populationOf }).diagnosis.verdict === 'sound';
    },
  },
  {
    name: 'H-alpha with optical depth 3 not flagged',
    allowed: 'at most 5 %',
    isCaught: (index) => selfAbsorption(72_000, index, 3) !== 'suspected',
  },
  {
    name: 'thin H-alpha flagged',
    allowed: 'about 1 %',
    isCaught: (index) => selfAbsorption(73_000, index, 0) === 'suspected',
  },
  {
    name: 'recombining gas (case B) called an electron temperature',
    allowed: 'never',
    isCaught(index) {
      const { kelvin, electronsPerCubicCentimetre, ratios } =
        recombination.rows[index % recombination.rows.length]!;
      const populationOf = (level: number): number => {
        const line = hydrogenLine(level);
        // Energy to photons to atoms in a sublevel.
        const photons = (ratios[level - 3] ?? 0) * line.wavelengthVacuumNm;
        return photons / (line.upperWeight * line.transitionProbabilityPerS);
      };
      const electronsPerCubicMetre = 1e6 * electronsPerCubicCentimetre;
      const { meaning } = lamp(74_000 + index, { kelvin, electronsPerCubicMetre, populationOf }).diagnosis;
      return meaning.kind === 'electron-temperature';
    },
  },
  {
    name: 'a temperature from a recording without any line',
    allowed: 'never',
    isCaught: (index) => withoutLines(75_000 + index).diagnosis.temperature.status !== 'not-determined',
  },
  {
    name: 'a species claimed in a pure hydrogen lamp',
    allowed: 'at most 1 %',
    isCaught: (index) => pureHydrogen(76_000 + index).diagnosis.impurities.length > 0,
  },
  {
    name: 'a species claimed where there is no line at all',
    allowed: 'at most 1 %',
    isCaught: (index) => withoutLines(77_000 + index).diagnosis.impurities.length > 0,
  },
];

const selfAbsorption = (seed: number, index: number, hAlphaOpticalDepth: number) =>
  lamp(seed + index, { hAlphaOpticalDepth, brightestPixelElectrons: lights[index % lights.length]! })
    .diagnosis.selfAbsorption.status;

/** Noise on a continuum, which may be bright, and may rise or fall. */
function withoutLines(seed: number): DiagnoseOutput {
  const random = createRandom(seed);
  const wavelengthNm = Float64Array.from({ length: 3648 }, (_, i) => 370 + (330 * i) / 3647);
  const electrons = 10 + 3000 * random.uniform() ** 3;
  const tilt = 2 * random.uniform() - 1;
  const signal = wavelengthNm.map((nm) => {
    const mean = electrons * (1 + (tilt * (nm - 535)) / 165);
    return Math.round(1000 + (random.poisson(mean) + 12 * random.normal()) / 5);
  });
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
