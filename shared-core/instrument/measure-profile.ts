import { findPeaks } from '../axis/find-peaks.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { fitNonlinear } from '../numeric/damped-least-squares.ts';
import type { LeastSquaresFit } from '../numeric/least-squares-problem.ts';
import { pseudoVoigtInstrument, type InstrumentTerm } from './instrument-term.ts';
import { lineParameterCount, profileModel, type ProfileFamily } from './profile-model.ts';
import { findReferenceLines, type ReferenceLine } from './reference-lines.ts';
import { pseudoVoigtFamily, tabulatedFamily, tabulatedShape } from './profile-families.ts';

/** How the instrument draws a narrow line, measured on lines of a reference lamp. */
export interface MeasuredProfile {
  readonly shape: 'pseudo-voigt' | 'tabulated';
  readonly fwhmNm: number;
  readonly fwhmSigmaNm: number;
  /** Of a pseudo-Voigt shape; null where the shape is tabulated. */
  readonly lorentzShare: number | null;
  readonly lorentzShareSigma: number | null;
  readonly terms: readonly InstrumentTerm[];
  /** nm, recorded axis, of the lines it was measured on, strongest first. */
  readonly linesNm: readonly number[];
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
}

export type WhyNoProfile = 'smoothed' | 'no-lines' | 'not-converged';

/** Deviance that a tabulated shape has to gain over a pseudo-Voigt one, besides two for each of its parameters. */
const leastGain = 15;
/** What is added for one line alone: how much the width of a grating instrument changes over its range (common practice). */
const unknownChange = 0.02;

/**
 * Measures the instrument's profile on the lines of a lamp whose own widths do not count (Hg, Ne, Ar at low pressure: a few
 * pm), all lines together.
 *
 * First as a pseudo-Voigt shape with its FWHM and Lorentz share. Where that misses the lines by more than noise, as behind
 * a wide slit, the shape is tabulated: Gaussians of half the width every quarter width, in pairs about the middle, and a
 * Lorentz part for the wings, all weights not negative. Lines that differ in width by more than their noise widen the
 * uncertainty: the width holds for places between them.
 *
 * @param recording  dark or offset removed; its clipped lines are left out
 * @source pseudo-Voigt: [Wertheim1974]; scatter beyond noise as a variance of its own: common practice
 * @check  test/unit/instrument/measure-profile.test.ts
 */
export function measureProfile(recording: CorrectedRecording): MeasuredProfile | WhyNoProfile {
  // A smoothed line is wider, and how much depends on its width.
  if (recording.noise.runningMeanPoints > 1) return 'smoothed';
  const search = findPeaks(recording, null);
  const lines = findReferenceLines(recording, search);
  if (lines.length === 0) return 'no-lines';
  const first = startWidth(recording, search.fwhmNm);
  const plain = fitFamily(recording, lines, pseudoVoigtFamily(null), [first, 0.2]);
  if (plain.fit.status !== 'converged') return 'not-converged';
  const [fwhmNm, lorentzShare] = plain.fit.values as unknown as [number, number];
  const size = plain.fit.values.length;
  const misfit = Math.max(1, plain.fit.chiSquare / plain.fit.degreesOfFreedom);
  const spread = widthSpread(recording, lines, fwhmNm, lorentzShare);
  const fwhmSigmaNm = Math.sqrt(misfit * plain.fit.covariance[0]! + spread * spread);
  const linesNm = lines.map(({ centreNm }) => centreNm);
  const { chiSquare, degreesOfFreedom } = plain.fit;
  if (chiSquare > degreesOfFreedom + 3.3 * Math.sqrt(2 * degreesOfFreedom)) {
    const family = tabulatedFamily(fwhmNm);
    const start = family.startShape;
    const tabulated = fitFamily(recording, lines, family, [...start], {
      lowest: start.map(() => 0),
      highest: start.map(() => 1),
      lineValues: plain.fit.values.subarray(2),
    });
    const gain = chiSquare - tabulated.fit.chiSquare;
    if (tabulated.fit.status === 'converged' && gain > misfit * (leastGain + 2 * start.length)) {
      const shape = tabulatedShape(family, tabulated.fit.values.subarray(0, start.length));
      return {
        shape: 'tabulated',
        fwhmNm: shape.fwhmNm,
        fwhmSigmaNm: (fwhmSigmaNm / fwhmNm) * shape.fwhmNm,
        lorentzShare: null,
        lorentzShareSigma: null,
        terms: shape.terms,
        linesNm,
        chiSquare: tabulated.fit.chiSquare,
        degreesOfFreedom: tabulated.fit.degreesOfFreedom,
      };
    }
  }
  return {
    shape: 'pseudo-voigt',
    fwhmNm,
    fwhmSigmaNm,
    lorentzShare,
    lorentzShareSigma: Math.sqrt(misfit * plain.fit.covariance[size + 1]!),
    terms: pseudoVoigtInstrument(lorentzShare),
    linesNm,
    chiSquare,
    degreesOfFreedom,
  };
}

/** The pixel widens what the search sees; the profile is that without it. */
function startWidth({ wavelengthNm }: CorrectedRecording, seenNm: number): number {
  const n = wavelengthNm.length;
  const pixelNm = (wavelengthNm[n - 1]! - wavelengthNm[0]!) / (n - 1);
  return Math.sqrt(Math.max(0.25 * seenNm * seenNm, seenNm * seenNm - 0.46 * pixelNm * pixelNm));
}

/**
 * Spread of the line widths beyond their own noise, nm, one standard deviation.
 * @source moments: E var(F) = spread^2 + mean sigma^2
 */
function widthSpread(
  recording: CorrectedRecording,
  lines: readonly ReferenceLine[],
  fwhmNm: number,
  lorentzShare: number,
): number {
  if (lines.length === 1) return unknownChange * fwhmNm;
  const widths: number[] = [];
  let noise = 0;
  for (const line of lines) {
    const { fit } = fitFamily(recording, [line], pseudoVoigtFamily(lorentzShare), [fwhmNm]);
    if (fit.status !== 'converged') continue;
    widths.push(fit.values[0]!);
    noise += fit.covariance[0]! * Math.max(1, fit.chiSquare / fit.degreesOfFreedom);
  }
  if (widths.length < 2) return unknownChange * fwhmNm;
  const mean = widths.reduce((sum, width) => sum + width, 0) / widths.length;
  const variance =
    widths.reduce((sum, width) => sum + (width - mean) * (width - mean), 0) / (widths.length - 1);
  return Math.sqrt(Math.max(0, variance - noise / widths.length));
}

interface FamilyChoices {
  readonly lowest: readonly number[];
  readonly highest: readonly number[];
  /** Area, centre, level and slope of every line, from an earlier fit. */
  readonly lineValues: Float64Array;
}

/** Of the Voigt integral over a pixel, see voigt-run.ts. */
const voigtPrecision = 1e-6;

/** Fits a family to the lines; without a gain the noise that grows with the light is measured on the residuals once. */
function fitFamily(
  recording: CorrectedRecording,
  lines: readonly ReferenceLine[],
  family: ProfileFamily,
  shape: readonly number[],
  choices: FamilyChoices | null = null,
): { readonly fit: LeastSquaresFit } {
  const { netSignal, noise, edgeNm } = recording;
  const observed = Float64Array.from(
    lines.flatMap(({ firstPx, endPx }) => [...netSignal.subarray(firstPx, endPx)]),
  );
  const fixed = Float64Array.from(
    lines.flatMap(({ firstPx, endPx }) => [...noise.fixedVariance.subarray(firstPx, endPx)]),
  );
  const ends = lines.map(({ firstPx, endPx }) => Math.min(netSignal[firstPx]!, netSignal[endPx - 1]!));
  const start = Float64Array.from([
    ...shape,
    ...(choices?.lineValues ?? lines.flatMap((line, index) => lineStart(recording, line, ends[index]!))),
  ]);
  const bound = (each: readonly number[], rest: number): Float64Array =>
    Float64Array.from([...each, ...new Array<number>(lines.length * lineParameterCount).fill(rest)]);
  const isPseudoVoigt = choices === null;
  const lowest = bound(
    isPseudoVoigt ? [1e-3 * shape[0]!, 0].slice(0, shape.length) : choices.lowest,
    -Infinity,
  );
  const highest = bound(isPseudoVoigt ? [Infinity, 1].slice(0, shape.length) : choices.highest, Infinity);
  const floor = noise.signalReference === 'baseline' ? Math.min(...ends) : 0;
  const solve = (variancePerSignal: number, from: Float64Array): LeastSquaresFit =>
    fitNonlinear({
      model: profileModel(edgeNm, lines, family),
      observed,
      precision: voigtPrecision,
      starts: [from],
      lowest,
      highest,
      variance: (modelled, variance) => {
        for (let i = 0; i < variance.length; i++)
          variance[i] = fixed[i]! + variancePerSignal * Math.max(0, modelled[i]! - floor);
      },
    });
  const fit = solve(noise.variancePerSignal, start);
  if (noise.gainElectronsPerCount !== null || fit.status !== 'converged') return { fit };
  const modelled = new Float64Array(observed.length);
  profileModel(edgeNm, lines, family).evaluate(fit.values, modelled);
  let excess = 0;
  let light = 0;
  for (let i = 0; i < observed.length; i++) {
    const residual = observed[i]! - modelled[i]!;
    excess += residual * residual - fixed[i]!;
    light += Math.max(0, modelled[i]! - floor);
  }
  return { fit: solve(Math.max(noise.variancePerSignal, excess / light), fit.values) };
}

function lineStart(
  { netSignal, wavelengthNm }: CorrectedRecording,
  { firstPx, endPx }: ReferenceLine,
  level: number,
): number[] {
  let area = 0;
  let top = firstPx;
  for (let px = firstPx; px < endPx; px++) {
    area += netSignal[px]! - level;
    if (netSignal[px]! > netSignal[top]!) top = px;
  }
  return [area, wavelengthNm[top]!, level, 0];
}
