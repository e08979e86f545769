/**
 * `npm run bench`: how fast a recording is diagnosed on one core, as a ratio to SciPy doing five Voigt fits in the
 * same windows in the same run. Nothing here is asserted by the test suite: times depend on the machine, ratios much less.
 */
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { readRecording } from '../../shared-core/recording/read-recording.ts';
import { recordingToCsv } from '../../shared-core/recording/write-csv.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { memoryGrowth } from './memory.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { inverseTemperatureDraws } from '../../shared-core/populations/temperature-monte-carlo.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import type { Bench } from '../../shared-core/bench/bench.ts';

const recordingCount = 40;
const rounds = 12;
const drawCount = 10_000;
/** Rounds before the clock starts: the engine compiles a function well only after it has run thousands of times. */
const warmUpRounds = 120;
const bench: Bench = {
  detector: { offsetCounts: 1000, gainElectronsPerCount: 5, readNoiseElectrons: 12, saturationCounts: 65535 },
  instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004 },
};

const files = Array.from({ length: recordingCount }, (_, index) => {
  const simulated = simulateRecording({
    bench,
    kelvin: 4000 + 200 * index,
    electronsPerCubicMetre: 1e20,
    seed: index,
    continuumElectrons: 40,
  });
  const rounded = simulated.wavelengthNm.map((nm) => Math.round(nm * 1e4) / 1e4);
  const text = recordingToCsv({ wavelengthNm: rounded, signal: simulated.signal });
  return { name: `bench-${String(index)}.csv`, bytes: new TextEncoder().encode(text), sha256: '' };
});

function read(file: (typeof files)[number]) {
  const recording = readRecording(file, bench);
  if (!recording.ok) throw new Error(recording.problem.code);
  return recording.value;
}

function compute(recording: ReturnType<typeof read>) {
  const result = diagnose({
    recording,
    dark: null,
    response: null,
    bench,
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}

/** Best of several rounds, seconds a recording: what the code needs when nothing else disturbs it. */
function bestSeconds(work: () => void, warmUp = warmUpRounds): number {
  for (let round = 0; round < warmUp; round++) work();
  let best = Infinity;
  for (let round = 0; round < rounds; round++) {
    const begin = performance.now();
    work();
    best = Math.min(best, (performance.now() - begin) / 1000 / recordingCount);
  }
  return best;
}

const recordings = files.map(read);
let check = 0;
const chainSeconds = bestSeconds(() => {
  for (const recording of recordings) check += compute(recording).diagnosis.temperature.kelvin ?? 0;
});
const fileSeconds = bestSeconds(() => {
  for (const file of files) check += compute(read(file)).diagnosis.temperature.kelvin ?? 0;
});
const job = {
  rounds,
  recordings: recordings.map((recording) => {
    const { evidence } = compute(recording);
    const { fits } = evidence;
    return {
      lines: fits.windows.map(({ firstPx, endPx }, index) => ({
        nm: [...recording.wavelengthNm.slice(firstPx, endPx)],
        counts: [...evidence.recording.netSignal.slice(firstPx, endPx)],
        sigma: [...fits.pixelVariance.slice(firstPx, endPx)].map(Math.sqrt),
        centre: fits.fits[index]!.recordedCentreNm,
      })),
    };
  }),
};

const line = (label: string, seconds: number): string =>
  `${label.padEnd(46)} ${(seconds * 1000).toFixed(2).padStart(8)} ms  ${(1 / seconds).toFixed(0).padStart(6)} recordings/s`;
console.log(line('diagnose, recording in memory', chainSeconds));
console.log(line('diagnose, from the bytes of the file', fileSeconds));
const python = spawnSync('python3', [join('test', 'bench', 'voigt_fits.py')], {
  input: JSON.stringify(job),
  encoding: 'utf8',
});
if (python.status === 0) {
  const [sampled, integrated] = python.stdout.trim().split(' ').map(Number) as [number, number];
  console.log(line('SciPy, five Voigt fits in the same windows', sampled));
  console.log(line('the same, integrated over the pixels as here', integrated));
  console.log(`ratio for the same model: ${(integrated / chainSeconds).toFixed(2)} (wanted: at least 5)`);
  console.log(`ratio against profiles sampled at pixel centres: ${(sampled / chainSeconds).toFixed(2)}`);
  console.log(
    `the same two, from the file: ${(integrated / fileSeconds).toFixed(2)}, ${(sampled / fileSeconds).toFixed(2)}`,
  );
} else {
  console.log('SciPy is not here, so there is no reference: install python3-scipy and run again.');
}
const drawSeconds =
  bestSeconds(() => {
    const { problem, boltzmann } = compute(recordings[10]!).evidence.temperature;
    const draw = inverseTemperatureDraws(problem!, boltzmann!, null)!;
    const random = createRandom(1);
    for (let i = 0; i < drawCount; i++) check += draw(random);
  }, 3) * recordingCount;
console.log(line(`${String(drawCount)} Monte Carlo draws of a temperature`, drawSeconds));
console.log(`in the time of ${(drawSeconds / chainSeconds).toFixed(0)} diagnoses (wanted: at most 50)`);
console.log(
  memoryGrowth((index) => {
    check += compute(recordings[index % recordings.length]!).diagnosis.temperature.kelvin ?? 0;
  }, 10_000),
);
if (!(check > 0)) process.exitCode = 1;
