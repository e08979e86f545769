import { erf } from '../numeric/error-function.ts';
import { exp, log } from '../numeric/portable-math.ts';
import type { FeatureShape } from './emitters.ts';

/** Linear estimators of the area of a known shape on a straight baseline, for `phaseCount + 1` places within a pixel. */
export interface KernelFamily {
  /** Taps before and after the pixel nearest to the place. */
  readonly before: number;
  readonly after: number;
  /** Row p: for a place (p/phaseCount - 1/2) pixel right of the nearest pixel's centre; length before + 1 + after. */
  readonly weights: readonly Float64Array[];
  /** Length of each row of weights: standard deviation of the area in noise of 1. */
  readonly norms: readonly number[];
  /** The shape itself, of unit area over all pixels; rows as above. */
  readonly shapes: readonly Float64Array[];
}

export const phaseCount = 8;

/**
 * Length over which a band fades from its head, nm: a rough mean over bands of diatomic molecules at 300 to 2000 K (own
 * choice; bands of N2 between 300 and 450 nm as molecular-band.ts draws them have 0.5 to 4).
 */
const bandFadingNm = 2;
/** Cells in which a band is drawn, per line width. */
const cellsPerWidth = 8;
/** Reach of an estimator in line widths, and of one for bands at least this far to both sides, nm. */
const reachWidths = 2.5;
const bandReachNm = 1.5;
/** Widths are rounded to steps of 6 %; a filter 3 % too wide loses nothing. */
const widthStep = 0.06;

const made = new Map<string, KernelFamily>();

/** The family for a line width and a pixel size; both are rounded, so that one recording needs few. */
export function kernelFamily(shape: FeatureShape, fwhmPx: number, pixelNm: number): KernelFamily {
  const widthIndex = Math.round(log(Math.max(1.2, fwhmPx)) / widthStep);
  const pixelIndex = shape === 'line' ? 0 : Math.round(log(pixelNm) / widthStep);
  const key = `${shape} ${String(widthIndex)} ${String(pixelIndex)}`;
  const known = made.get(key);
  if (known !== undefined) return known;
  const family = makeFamily(shape, exp(widthIndex * widthStep), exp(pixelIndex * widthStep));
  if (made.size > 200) made.clear();
  made.set(key, family);
  return family;
}

/**
 * Weights w = g/(g'g), g being the shape less its projection on a straight line over the taps: the least-squares
 * estimator of the area in equal noise, blind to any straight baseline.
 * @source matched filter: [Turin1960]; projection: [Draper1998] sec. 1.2
 * @check  test/unit/identify/place-kernels.test.ts
 */
function makeFamily(shape: FeatureShape, fwhmPx: number, pixelNm: number): KernelFamily {
  const reach = Math.max(3, Math.ceil(reachWidths * fwhmPx));
  const before = shape === 'line' ? reach : Math.max(reach, Math.ceil(bandReachNm / pixelNm));
  const shapeAt = shape === 'line' ? lineShape(fwhmPx) : bandShape(shape, fwhmPx, bandFadingNm / pixelNm);
  const shapes: Float64Array[] = [];
  const weights: Float64Array[] = [];
  for (let phase = 0; phase <= phaseCount; phase++) {
    const offset = phase / phaseCount - 0.5;
    const values = Float64Array.from({ length: 2 * before + 1 }, (_, k) => shapeAt(k - before - offset));
    shapes.push(values);
    weights.push(estimatorOf(values));
  }
  const norms = weights.map((row) => Math.sqrt(row.reduce((sum, w) => sum + w * w, 0)));
  return { before, after: before, weights, norms, shapes };
}

/** Share per pixel at a distance from the place in pixels. */
type ShapeFunction = (x: number) => number;

const lineShape = (fwhmPx: number): ShapeFunction => {
  const sigma = fwhmPx / gaussianWidth;
  return (x) => (Math.abs(x) > 5 * sigma ? 0 : exp((-0.5 * x * x) / (sigma * sigma)) / (sigma * rootTwoPi));
};

/**
 * A band through the instrument: at a head the lines crowd as one over the root of the distance, which is what the vertex
 * of a parabola does, and farther in they fade as an exponential.
 * @source [Herzberg1950] ch. IV for the parabola; the fading is our own choice
 */
function bandShape(shape: 'violet' | 'red', fwhmPx: number, fadingPx: number): ShapeFunction {
  const cellPx = fwhmPx / cellsPerWidth;
  const share = (depth: number): number => erf(Math.sqrt(depth / fadingPx));
  const cells = Array.from({ length: Math.ceil((5 * fadingPx) / cellPx) }, (_, index) => ({
    depth: (index + 0.5) * cellPx,
    share: share((index + 1) * cellPx) - share(index * cellPx),
  }));
  const line = lineShape(fwhmPx);
  const inwards = shape === 'violet' ? -1 : 1;
  return (x) => cells.reduce((sum, cell) => sum + cell.share * line(x - inwards * cell.depth), 0);
}

/** FWHM of a Gaussian over its sigma, sqrt(8 ln 2). */
export const gaussianWidth = 2.3548200450309493;
/** sqrt(2 pi). */
const rootTwoPi = 2.5066282746310002;

function estimatorOf(shape: Float64Array): Float64Array {
  const n = shape.length;
  const middle = (n - 1) / 2;
  let mean = 0;
  let slope = 0;
  let spread = 0;
  for (let k = 0; k < n; k++) {
    const x = k - middle;
    mean += shape[k]! / n;
    slope += shape[k]! * x;
    spread += x * x;
  }
  slope /= spread;
  const weights = new Float64Array(n);
  let norm = 0;
  for (let k = 0; k < n; k++) {
    const rest = shape[k]! - mean - slope * (k - middle);
    weights[k] = rest;
    norm += rest * rest;
  }
  for (let k = 0; k < n; k++) weights[k] = weights[k]! / norm;
  return weights;
}
