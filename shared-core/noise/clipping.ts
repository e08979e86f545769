export interface ClippingInput {
  /** As recorded, before the dark is removed: that is where the converter clips. */
  readonly signal: Float64Array;
  /** Counts; from the bench file, null when not given. */
  readonly saturationCounts: number | null;
  readonly quantisationStep: number;
  /** 1 sigma of a pixel without light, unit of `signal`. */
  readonly baselineSigma: number;
  /** Counts of variance per count of signal; 0 when not known. */
  readonly variancePerSignal: number;
  /** Correlation of the noise of neighbouring points; 0 when each has its own. */
  readonly neighbourCorrelation: number;
}

export interface Clipping {
  readonly clipped: Uint8Array;
  /** Lowest level at which clipping was found, unit of `signal`; null when none. */
  readonly level: number | null;
}

/** Chance below which equal neighbours at the top of a peak are taken for clipping. */
const chanceLimit = 1e-4;
/** The same for the highest value of the recording, of which there is only one. */
const chanceLimitAtTop = 1e-2;

/**
 * Finds pixels that hit a ceiling, at whatever level it lies.
 *
 * A ceiling given by the bench file is taken at its word. Beyond that a run of exactly equal values that tops its
 * surroundings is tested: noise of standard deviation s and correlation c with its neighbour, digitised in steps q, repeats
 * a value with probability about q/(2 s sqrt(pi (1 - c))), so a run of r equal values has that to the power r - 1. Every pixel at or above a level
 * found so is marked. Rounded tops without equal values are not seen here: the line fit tests for those, because
 * it knows what the line should look like (lines/core-deficit.ts).
 *
 * @check test/unit/noise/clipping.test.ts
 */
export function findClipping(input: ClippingInput): Clipping {
  const { signal, saturationCounts } = input;
  const clipped = new Uint8Array(signal.length);
  let level = saturationCounts ?? Infinity;
  let anyAtLevel = false;
  let highest = -Infinity;
  for (let i = 0; i < signal.length; i++) highest = Math.max(highest, signal[i]!);
  for (let start = 0; start < signal.length - 1;) {
    let end = start + 1;
    if (signal[end] !== signal[start]) {
      start = end;
      continue;
    }
    while (end < signal.length && signal[end] === signal[start]) end++;
    const light = lightOnTop(input, start, end);
    if (light > 0 && unlikelyByChance(input, end - start, light, signal[start] === highest))
      level = Math.min(level, signal[start]!);
    start = end;
  }
  for (let i = 0; i < signal.length; i++) {
    if (signal[i]! >= level) {
      clipped[i] = 1;
      anyAtLevel = true;
    }
  }
  return { clipped, level: anyAtLevel ? level : null };
}

/** How far a run of equal values stands above the lowest point around it; 0 where it tops nothing. */
function lightOnTop({ signal, baselineSigma }: ClippingInput, start: number, end: number): number {
  const value = signal[start]!;
  const reach = Math.max(5, 2 * (end - start));
  let lowest = value;
  for (let i = Math.max(0, start - reach); i < Math.min(signal.length, end + reach); i++) {
    if (signal[i]! > value) return 0;
    lowest = Math.min(lowest, signal[i]!);
  }
  return value - lowest > 20 * baselineSigma ? value - lowest : 0;
}

function unlikelyByChance(
  { baselineSigma, variancePerSignal, neighbourCorrelation, quantisationStep }: ClippingInput,
  runLength: number,
  light: number,
  isHighest: boolean,
): boolean {
  // Baseline and its noise are what the recording shows in the dark: only the light above it adds photon noise.
  const variance = baselineSigma * baselineSigma + variancePerSignal * light;
  const sigma = Math.sqrt(variance * Math.max(0, 1 - neighbourCorrelation));
  if (sigma <= 0) return true;
  const chance = Math.min(1, quantisationStep / (2 * sigma * 1.7724538509055159));
  let all = 1;
  for (let i = 1; i < runLength; i++) all *= chance;
  return all < (isHighest ? chanceLimitAtTop : chanceLimit);
}
