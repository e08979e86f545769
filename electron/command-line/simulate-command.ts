import { mkdir } from 'node:fs/promises';
import { join } from 'node:path';
import { responseAt } from '../../shared-core/populations/response-at.ts';
import { recordingToCsv } from '../../shared-core/recording/write-csv.ts';
import { problemSentence } from '../../shared-core/result/result.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { atomicWrite } from '../services/atomic-write.ts';
import { type BenchAndResponse, loadBenchAndResponse } from '../services/bench-and-response.ts';
import { systemReason } from '../services/read-input-file.ts';
import type { ExitStatus } from './exit-status.ts';
import type { Output } from './output.ts';
import { numberOption, readWords, UsageFault } from './usage.ts';

interface SimulateArguments {
  readonly bench: string | null;
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  readonly seed: number;
  readonly count: number;
  readonly deuteriumFraction: number;
  readonly opticalDepth: number;
  readonly out: string;
}

/** `lampwright simulate`: recordings with known truth; the same seed gives the same file, byte for byte. */
export async function simulateCommand(words: readonly string[], output: Output): Promise<ExitStatus> {
  const args = simulateArguments(words);
  const loaded = await loadBenchAndResponse(args.bench);
  if (!loaded.ok) {
    output.complain(problemSentence(loaded.problem));
    return 1;
  }
  try {
    if (args.count > 1) await mkdir(args.out, { recursive: true });
    for (let index = 0; index < args.count; index += 1) {
      const path = args.count > 1 ? join(args.out, numberedName(index + 1)) : args.out;
      const seed = args.seed + index;
      const recording = simulateRecording({
        bench: loaded.value.bench,
        responseAt: countsPerPhotonAt(loaded.value),
        kelvin: args.kelvin,
        electronsPerCubicMetre: args.electronsPerCubicMetre,
        deuteriumRatio: args.deuteriumFraction / (1 - args.deuteriumFraction),
        hAlphaOpticalDepth: args.opticalDepth,
        seed,
      });
      await atomicWrite(path, recordingToCsv(recording));
      await output.print(`${path}  seed ${String(seed)}\n`);
    }
    return 0;
  } catch (error) {
    if (!(error instanceof Error && 'code' in error)) throw error;
    output.complain(
      `Could not write to "${args.out}": ${systemReason(error)}. Check the folder and the space on the disk.`,
    );
    return 1;
  }
}

const numberedName = (number: number): string => `simulated-${String(number).padStart(4, '0')}.csv`;

function simulateArguments(words: readonly string[]): SimulateArguments {
  const { values, positionals } = readWords(words, {
    bench: { type: 'string' },
    temperature: { type: 'string' },
    'electron-density': { type: 'string' },
    seed: { type: 'string' },
    count: { type: 'string' },
    deuterium: { type: 'string' },
    'optical-depth': { type: 'string' },
    out: { type: 'string' },
  });
  if (positionals[0] !== undefined)
    throw new UsageFault(`simulate takes no "${positionals[0]}"; use --out PATH.`);
  if (values.out === undefined || values.out === '') throw new UsageFault('simulate wants --out PATH.');
  return {
    bench: values.bench ?? null,
    kelvin: numberOption('temperature', values.temperature, { min: 500, max: 200_000, unit: 'K' }),
    electronsPerCubicMetre: numberOption('electron-density', values['electron-density'], {
      min: 1e10,
      max: 1e25,
      unit: 'per m3',
    }),
    seed: numberOption('seed', values.seed ?? '1', { min: 0, max: 4_000_000_000, isWhole: true, unit: '' }),
    count: numberOption('count', values.count ?? '1', { min: 1, max: 100_000, isWhole: true, unit: '' }),
    deuteriumFraction: numberOption('deuterium', values.deuterium ?? '0', { min: 0, max: 0.99, unit: '' }),
    opticalDepth: numberOption('optical-depth', values['optical-depth'] ?? '0', {
      min: 0,
      max: 20,
      unit: '',
    }),
    out: values.out,
  };
}

/**
 * Relative counts per photon at a wavelength, as the bench's own response table has it, so that a diagnosis with the
 * same bench file finds the truth again. Beyond its ends the table goes on as it ends.
 */
function countsPerPhotonAt({ bench, response }: BenchAndResponse): (nm: number) => number {
  const isEnergy = bench.response?.per === 'energy' || bench.detector?.signal === 'energy';
  // A photon carries energy in proportion to 1 / wavelength.
  const perPhoton = (relative: number, nm: number): number => (isEnergy ? relative / nm : relative);
  if (response === null) return (nm) => perPhoton(1, nm);
  const [first = 0] = response.wavelengthNm;
  const last = response.wavelengthNm.at(-1) ?? first;
  return (nm) => {
    const inside = Math.min(last, Math.max(first, nm));
    return perPhoton(responseAt(response, [inside]).response[0] ?? 1, nm);
  };
}
