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
  readonly mean: number;
  readonly standardUncertainty: number;
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
 * @param draw  one value of the quantity from one set of drawn inputs
 * @source [JCGM101] clause 7, adaptive procedure 7.9; shortest interval 7.7
 * @check  test/reference/monte-carlo.test.ts
 */
export function* propagateByDrawing(
  draw: (random: Random) => number,
  { seed, coverage, digits, maxTrials }: MonteCarloSettings,
): Generator<MonteCarloSummary, void> {
  const batchSize = Math.min(maxTrials, Math.max(Math.ceil(100 / (1 - coverage)), 10_000));
  const batches: { mean: number; u: number; low: number; high: number }[] = [];
  let values: Float64Array = new Float64Array(0);
  for (let batch = 0; values.length + batchSize <= maxTrials; batch++) {
    const random = createRandom((seed + Math.imul(batch, 0x632be5ab)) >>> 0);
    const fresh = new Float64Array(batchSize);
    for (let i = 0; i < batchSize; i++) fresh[i] = draw(random);
    fresh.sort();
    const own = summarise(fresh, coverage);
    batches.push({ mean: own.mean, u: own.standardUncertainty, low: own.low, high: own.high });
    values = merged(values, fresh);
    const all = summarise(values, coverage);
    const tolerance = lastDigitTolerance(all.standardUncertainty, digits);
    const isStable =
      batches.length > 1 &&
      (['mean', 'u', 'low', 'high'] as const).every(
        (name) => 2 * deviationOfMean(batches.map((each) => each[name])) < tolerance,
      );
    yield { ...all, trials: values.length, isStable, tolerance };
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

/** Mean, standard deviation and intervals of sorted values. */
function summarise(sorted: Float64Array, coverage: number) {
  const n = sorted.length;
  let sum = 0;
  for (const value of sorted) sum += value;
  const mean = sum / n;
  let squares = 0;
  for (const value of sorted) squares += (value - mean) * (value - mean);
  const inside = Math.min(n - 1, Math.floor(coverage * n + 0.5));
  const left = Math.floor(0.5 * (n - inside));
  let shortest = 0;
  for (let i = 0; i + inside < n; i++) {
    if (sorted[i + inside]! - sorted[i]! < sorted[shortest + inside]! - sorted[shortest]!) shortest = i;
  }
  return {
    mean,
    standardUncertainty: Math.sqrt(squares / (n - 1)),
    low: sorted[left]!,
    high: sorted[Math.min(n - 1, left + inside)]!,
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
