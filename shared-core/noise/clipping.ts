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
 * surroundings is tested: noise of standard deviation s, digitised in steps q, repeats a value with probability
 * about q/(2 s sqrt(pi)), so a run of r equal values has that to the power r - 1. Every pixel at or above a level
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
    if (
      topsItsSurroundings(input, start, end) &&
      unlikelyByChance(input, start, end, signal[start] === highest)
    ) {
      level = Math.min(level, signal[start]!);
    }
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

function topsItsSurroundings(input: ClippingInput, start: number, end: number): boolean {
  const { signal, baselineSigma } = input;
  const value = signal[start]!;
  const reach = Math.max(5, 2 * (end - start));
  let lowest = value;
  for (let i = Math.max(0, start - reach); i < Math.min(signal.length, end + reach); i++) {
    if (signal[i]! > value) return false;
    lowest = Math.min(lowest, signal[i]!);
  }
  return value - lowest > 20 * baselineSigma;
}

function unlikelyByChance(input: ClippingInput, start: number, end: number, isHighest: boolean): boolean {
  const value = Math.max(0, input.signal[start]!);
  const sigma = Math.sqrt(input.baselineSigma * input.baselineSigma + input.variancePerSignal * value);
  if (sigma <= 0) return true;
  const chance = Math.min(1, input.quantisationStep / (2 * sigma * 1.7724538509055159));
  let all = 1;
  for (let i = start + 1; i < end; i++) all *= chance;
  return all < (isHighest ? chanceLimitAtTop : chanceLimit);
}
