import { logGamma } from './incomplete-gamma.ts';
import { exp, log } from './portable-math.ts';

/** A stream of random numbers that is the same for the same seed on every machine. */
export interface Random {
  /** Uniform in [0, 1), 53 bits. */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** Poisson with the given mean, >= 0; whole number. */
  poisson(mean: number): number;
}

/**
 * Seeded random numbers.
 *
 * Uniform: xoshiro128** (D. Blackman, S. Vigna, ACM Trans. Math. Softw. 47, 36 (2021)), seeded by SplitMix-like mixing.
 * Normal: polar method (G. Marsaglia, T. A. Bray, SIAM Rev. 6, 260 (1964)).
 * Poisson: multiplication below 10, transformed rejection PTRS above (W. Hoermann, Insurance Math. Econ. 12, 39 (1993)).
 *
 * @param seed  any whole number, 0 to 2^32 - 1
 * @check test/reference/random.test.ts
 */
export function createRandom(seed: number): Random {
  const state = new Uint32Array(4);
  let mixer = seed >>> 0;
  for (let i = 0; i < 4; i++) {
    mixer = (mixer + 0x9e3779b9) >>> 0;
    let z = mixer;
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
    state[i] = (z ^ (z >>> 15)) >>> 0;
  }
  let spare: number | null = null;

  function next(): number {
    const s1 = state[1]!;
    const result = Math.imul(rotate(Math.imul(s1, 5), 7), 9) >>> 0;
    const shifted = s1 << 9;
    state[2] = state[2]! ^ state[0]!;
    state[3] = state[3]! ^ s1;
    state[1] = s1 ^ state[2];
    state[0] = state[0]! ^ state[3];
    state[2] = state[2] ^ shifted;
    state[3] = rotate(state[3], 11);
    return result;
  }

  function uniform(): number {
    return ((next() >>> 5) * 67108864 + (next() >>> 6)) / 9007199254740992;
  }

  function normal(): number {
    if (spare !== null) {
      const kept = spare;
      spare = null;
      return kept;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const s = u * u + v * v;
      if (s >= 1 || s === 0) continue;
      const factor = Math.sqrt((-2 * log(s)) / s);
      spare = v * factor;
      return u * factor;
    }
  }

  function poisson(mean: number): number {
    if (!(mean > 0)) return 0;
    if (mean < 10) {
      const limit = exp(-mean);
      let count = 0;
      for (let product = uniform(); product > limit; product *= uniform()) count++;
      return count;
    }
    const b = 0.931 + 2.53 * Math.sqrt(mean);
    const a = -0.059 + 0.02483 * b;
    const inverseAlpha = 1.1239 + 1.1328 / (b - 3.4);
    const quick = 0.9277 - 3.6224 / (b - 2);
    const logMean = log(mean);
    for (;;) {
      const u = uniform() - 0.5;
      const v = uniform();
      const us = 0.5 - Math.abs(u);
      const k = Math.floor(((2 * a) / us + b) * u + mean + 0.43);
      if (us >= 0.07 && v <= quick) return k;
      if (k < 0 || (us < 0.013 && v > us)) continue;
      if (log((v * inverseAlpha) / (a / (us * us) + b)) <= k * logMean - mean - logGamma(k + 1)) return k;
    }
  }

  return { uniform, normal, poisson };
}

function rotate(value: number, by: number): number {
  return ((value << by) | (value >>> (32 - by))) >>> 0;
}
