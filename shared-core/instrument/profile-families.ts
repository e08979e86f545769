import { exp } from '../numeric/portable-math.ts';
import { gaussianFwhmPerSigma } from '../numeric/voigt-run.ts';
import type { InstrumentTerm } from './instrument-term.ts';
import type { ProfileFamily } from './profile-model.ts';

const gaussian: InstrumentTerm = { weight: 1, gaussianShare: 1, lorentzianShare: 0, shiftShare: 0 };
/** With a Gauss part that widens it by 0.05 %: a pure Lorentz profile is beyond the reach of the Voigt integral. */
const lorentzian: InstrumentTerm = { weight: 1, gaussianShare: 0.03, lorentzianShare: 1, shiftShare: 0 };

/** Gaussian and Lorentzian of one FWHM; the Lorentz share is fitted where null is given. */
export function pseudoVoigtFamily(lorentzShare: number | null): ProfileFamily {
  return {
    terms: [gaussian, lorentzian],
    weights: ([share = 0]) => {
      const of = lorentzShare ?? share;
      return Float64Array.of(1 - of, of);
    },
    slopes: lorentzShare === null ? [Float64Array.of(-1, 1)] : [],
    parameterCount: lorentzShare === null ? 1 : 0,
    fixedFwhmNm: null,
  };
}

/** Pairs of Gaussians beside the middle one, their distance and their width, in widths of the pseudo-Voigt shape. */
const pairCount = 5;
const spacing = 0.25;
const basisWidth = 0.5;

export interface TabulatedFamily extends ProfileFamily {
  /** Weights of the pairs and of the Lorentz part of a Gaussian of the whole width; what is left is the middle's. */
  readonly startShape: readonly number[];
}

export function tabulatedFamily(fwhmNm: number): TabulatedFamily {
  const at = (shiftShare: number): InstrumentTerm => ({
    weight: 1,
    gaussianShare: basisWidth,
    lorentzianShare: 0,
    shiftShare,
  });
  const pairs = Array.from({ length: pairCount }, (_, k) => (k + 1) * spacing);
  const terms = [at(0), ...pairs.flatMap((shift) => [at(-shift), at(shift)]), lorentzian];
  const parameterCount = pairCount + 1;
  const slopes = Array.from({ length: parameterCount }, (_, p) => {
    const slope = new Float64Array(terms.length);
    slope[0] = -1;
    if (p === pairCount) slope[terms.length - 1] = 1;
    else slope.fill(0.5, 1 + 2 * p, 3 + 2 * p);
    return slope;
  });
  const weights = (shape: Float64Array): Float64Array => {
    const sum = new Float64Array(terms.length);
    sum[0] = 1;
    for (const [p, slope] of slopes.entries())
      for (let k = 0; k < sum.length; k++) sum[k] = sum[k]! + shape[p]! * slope[k]!;
    return sum;
  };
  // What a Gaussian of this width has there once the width of the basis is taken off.
  const sigma = Math.sqrt(1 - basisWidth * basisWidth) / gaussianFwhmPerSigma;
  const heights = pairs.map((shift) => 2 * exp(-0.5 * (shift / sigma) * (shift / sigma)));
  const total = 1 + heights.reduce((sum, height) => sum + height, 0);
  return {
    terms,
    weights,
    slopes,
    parameterCount,
    fixedFwhmNm: fwhmNm,
    startShape: [...heights.map((height) => height / total), 0.02],
  };
}

/** Terms too faint to matter are dropped. */
const leastWeight = 1e-4;

/** The shape with its own FWHM, found by bisection of half its height, and its terms in units of that. */
export function tabulatedShape(
  family: TabulatedFamily,
  shape: Float64Array,
): { readonly fwhmNm: number; readonly terms: readonly InstrumentTerm[] } {
  const weights = family.weights(shape);
  const heightAt = (x: number): number =>
    family.terms.reduce((sum, term, k) => sum + weights[k]! * termHeight(term, x), 0);
  const half = 0.5 * heightAt(0);
  let low = 0;
  let high = 3;
  for (let step = 0; step < 50; step++) {
    const middle = 0.5 * (low + high);
    if (heightAt(middle) > half) low = middle;
    else high = middle;
  }
  const width = low + high;
  const kept = family.terms
    .map((term, k) => ({
      weight: weights[k]!,
      gaussianShare: term.gaussianShare / width,
      lorentzianShare: term.lorentzianShare / width,
      shiftShare: term.shiftShare / width,
    }))
    .filter(({ weight }) => weight > leastWeight);
  const total = kept.reduce((sum, { weight }) => sum + weight, 0);
  return {
    fwhmNm: width * family.fixedFwhmNm!,
    terms: kept.map((term) => ({ ...term, weight: term.weight / total })),
  };
}

function termHeight({ gaussianShare, lorentzianShare, shiftShare }: InstrumentTerm, x: number): number {
  const distance = x - shiftShare;
  if (lorentzianShare > 0) {
    const half = 0.5 * lorentzianShare;
    return half / (Math.PI * (distance * distance + half * half));
  }
  const sigma = gaussianShare / gaussianFwhmPerSigma;
  const deviate = distance / sigma;
  return exp(-0.5 * deviate * deviate) / (sigma * rootTwoPi);
}

const rootTwoPi = 2.5066282746310002;
