import { erfc } from '../numeric/error-function.ts';
import { exp, log } from '../numeric/portable-math.ts';
import { logGamma } from '../numeric/incomplete-gamma.ts';

/** Upper tail of the standard normal distribution. */
export const normalTail = (z: number): number => 0.5 * erfc(z / Math.SQRT2);

/**
 * Natural log of the probability that, of `count` independent places without a line of the species, those whose own
 * probability is at most `limit` have a product as small as found: the truncated product of p-values.
 *
 * P(W <= w) = sum over j = 1..count of C(count, j) (1 - limit)^(count - j) A_j, with
 * A_j = w sum over s < j of (j ln limit - ln w)^s/s! where w <= limit^j, else limit^j.
 *
 * @param lnProduct  ln w: sum of ln p over the places with p <= limit, <= 0
 * @param limit      in (0, 1)
 * @source [Zaykin2002] eq. 2
 * @check  test/unit/identify/chance.test.ts
 */
export function lnTruncatedProductChance(count: number, lnProduct: number, limit: number): number {
  const lnLimit = log(limit);
  const lnRest = log(1 - limit);
  let total = -Infinity;
  for (let j = 1; j <= count; j++) {
    const lnChoices = logGamma(count + 1) - logGamma(j + 1) - logGamma(count - j + 1);
    total = lnSum(total, lnChoices + (count - j) * lnRest + lnPart(j, lnProduct, lnLimit));
  }
  return Math.min(0, total);
}

function lnPart(j: number, lnProduct: number, lnLimit: number): number {
  const excess = j * lnLimit - lnProduct;
  if (excess <= 0) return j * lnLimit;
  let term = 1;
  let sum = 1;
  for (let s = 1; s < j; s++) {
    term *= excess / s;
    sum += term;
  }
  return lnProduct + log(sum);
}

function lnSum(a: number, b: number): number {
  const most = Math.max(a, b);
  return most === -Infinity ? most : most + log(exp(a - most) + exp(b - most));
}

/** Peaks of this recording that no species explains yet. */
export interface StrayPeaks {
  /** nm, recorded axis. */
  readonly places: readonly { readonly recordedNm: number; readonly signalToNoise: number }[];
  /** nm, of the whole recording. */
  readonly spanNm: number;
}

/** The peak search keeps what stands out by this much; fainter peaks are taken to be more in proportion. */
const searchedSignalToNoise = 4;
/** nm; lines of a molecule crowd in places. */
const neighbourhoodNm = 25;

/**
 * Probability that a place without a line of its own shows a top this strong: by noise, or by a line of something else,
 * whose density is that of the stray peaks at least as strong, over all the recording or nearby, whichever is more.
 * @param widthNm  interval in which a top would pass
 * @check test/unit/identify/chance.test.ts
 */
export function chanceOfPlace(
  place: { readonly recordedNm: number; readonly signalToNoise: number; readonly widthNm: number },
  strays: StrayPeaks,
  fwhmNm: number,
): number {
  const { recordedNm, signalToNoise, widthNm } = place;
  const trials = 2 + widthNm / (0.7 * fwhmNm);
  const level = Math.max(signalToNoise, searchedSignalToNoise);
  let everywhere = 0;
  let near = 0;
  for (const stray of strays.places) {
    if (stray.signalToNoise < level) continue;
    everywhere++;
    if (Math.abs(stray.recordedNm - recordedNm) < neighbourhoodNm) near++;
  }
  const density =
    Math.max((everywhere + 1) / strays.spanNm, near / Math.min(strays.spanNm, 2 * neighbourhoodNm)) *
    (level / signalToNoise);
  return Math.min(1, trials * normalTail(signalToNoise) + density * widthNm);
}
