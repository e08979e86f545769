import { createRandom, type Random } from '../numeric/random.ts';

/** How a Monte Carlo propagation runs. */
export interface MonteCarloSettings {
  readonly seed: number;
  /** 0 to 1. */
  readonly coverage: number;
  /** Significant digits of the standard uncertainty that shall be stable: 1 or 2. */
  readonly digits: 1 | 2;
  readonly maxTrials: number;
}

/** What the trials so far say; `low` and `high` hold the stated coverage, as much left out above as below. */
export interface MonteCarloSummary {
  readonly trials: number;
  /** Draws that had no answer, beside the trials. */
  readonly failed: number;
  readonly mean: number;
  readonly median: number;
  readonly standardUncertainty: number;
  /** Third central moment over the cube of the standard uncertainty; 0 for a symmetric distribution. */
  readonly skewness: number;
  readonly low: number;
  readonly high: number;
  /** The shortest interval of the same coverage. */
  readonly shortest: { readonly low: number; readonly high: number };
  /** Whether mean, uncertainty and both ends are stable to `tolerance` (twice their standard deviation over the batches). */
  readonly isStable: boolean;
  /** Half a unit in the last significant digit of the standard uncertainty. */
  readonly tolerance: number;
}

/**
 * Propagates distributions by drawing: batches of max(100/(1 - coverage), 10 000) trials until all four results are
 * stable or `maxTrials` is reached. Yields after every batch; the last yield is the result. Batch k draws from its own
 * stream of the seed, so the result depends on nothing but the seed.
 *
 * @param draw  one finite value of the quantity from one set of drawn inputs; NaN where it has none, which is counted and
 *              leaves the caller to judge whether the others may stand alone
 * @source [JCGM101] clause 7: adaptive procedure 7.9, coverage intervals 7.7
 * @check  test/reference/monte-carlo.test.ts
 */
export function* propagateByDrawing(
  draw: (random: Random) => number,
  { seed, coverage, digits, maxTrials }: MonteCarloSettings,
): Generator<MonteCarloSummary, void> {
  const batchSize = Math.min(maxTrials, Math.max(Math.ceil(100 / (1 - coverage)), 10_000));
  const batches: { mean: number; u: number; low: number; high: number }[] = [];
  let values: Float64Array = new Float64Array(0);
  let failed = 0;
  for (let batch = 0; failed + values.length + batchSize <= maxTrials; batch++) {
    const random = createRandom((seed + Math.imul(batch, 0x632be5ab)) >>> 0);
    const drawn = new Float64Array(batchSize);
    let count = 0;
    for (let i = 0; i < batchSize; i++) {
      const value = draw(random);
      if (!Number.isNaN(value)) drawn[count++] = value;
    }
    failed += batchSize - count;
    if (count < 2) return;
    const fresh = drawn.subarray(0, count).sort();
    const own = summarise(fresh, coverage);
    batches.push({ mean: own.mean, u: own.standardUncertainty, low: own.low, high: own.high });
    values = merged(values, fresh);
    const all = summarise(values, coverage);
    const tolerance = lastDigitTolerance(all.standardUncertainty, digits);
    const isStable =
      batches.length > 1 &&
      (['mean', 'u', 'low', 'high'] as const).every(
        (name) => 2 * deviationOfMean(batches.map((each) => each[name])) <= tolerance,
      );
    yield { ...all, trials: values.length, failed, isStable, tolerance };
    if (isStable) return;
  }
}

/**
 * Half a unit in the last of `digits` significant digits of an uncertainty: u = c 10^l with c of `digits` digits, 10^l/2.
 * @source [JCGM101] 7.9.2
 * @check  test/reference/monte-carlo.test.ts
 */
export function lastDigitTolerance(standardUncertainty: number, digits: 1 | 2): number {
  if (!(standardUncertainty > 0) || !Number.isFinite(standardUncertainty)) return 0;
  // Exact: the decimal exponent as the language itself writes it.
  const exponent = Number(standardUncertainty.toExponential(digits - 1).split('e')[1]);
  return 0.5 * Number(`1e${String(exponent - digits + 1)}`);
}

/**
 * Whether a first-order interval agrees with that of the trials: both ends within the tolerance.
 * @source [JCGM101] clause 8
 * @check  test/reference/monte-carlo.test.ts
 */
export function confirmsFirstOrder(
  firstOrder: { readonly low: number; readonly high: number },
  trials: { readonly low: number; readonly high: number },
  tolerance: number,
): boolean {
  return (
    Math.abs(firstOrder.low - trials.low) <= tolerance && Math.abs(firstOrder.high - trials.high) <= tolerance
  );
}

/** Moments and coverage intervals of sorted values. */
function summarise(sorted: Float64Array, coverage: number) {
  const n = sorted.length;
  let sum = 0;
  for (const value of sorted) sum += value;
  const mean = sum / n;
  let squares = 0;
  let cubes = 0;
  for (const value of sorted) {
    const off = value - mean;
    squares += off * off;
    cubes += off * off * off;
  }
  const standardUncertainty = Math.sqrt(squares / (n - 1));
  // The supplement counts from 1: ends at r and r + q with q = coverage n and r = (n - q)/2, to the nearest whole number.
  const inside = Math.min(n - 1, Math.floor(coverage * n + 0.5));
  const first = Math.max(0, Math.floor(0.5 * (n - inside + 1)) - 1);
  let shortest = 0;
  for (let i = 0; i + inside < n; i++) {
    if (sorted[i + inside]! - sorted[i]! < sorted[shortest + inside]! - sorted[shortest]!) shortest = i;
  }
  const u = standardUncertainty;
  return {
    mean,
    median: 0.5 * (sorted[Math.floor(0.5 * (n - 1))]! + sorted[Math.floor(0.5 * n)]!),
    standardUncertainty,
    skewness: u > 0 ? cubes / (n * u * u * u) : 0,
    low: sorted[first]!,
    high: sorted[first + inside]!,
    shortest: { low: sorted[shortest]!, high: sorted[shortest + inside]! },
  };
}

function merged(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length + b.length);
  let i = 0;
  let j = 0;
  for (let k = 0; k < out.length; k++) {
    out[k] = j >= b.length || (i < a.length && a[i]! <= b[j]!) ? a[i++]! : b[j++]!;
  }
  return out;
}

/** Standard deviation of the mean of some numbers. */
function deviationOfMean(values: readonly number[]): number {
  const n = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const squares = values.reduce((sum, value) => sum + (value - mean) * (value - mean), 0);
  return Math.sqrt(squares / (n * (n - 1)));
}
