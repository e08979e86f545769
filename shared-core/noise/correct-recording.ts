import type { Bench } from '../bench/bench.ts';
import type { Recording } from '../recording/recording.ts';
import { fail, ok, type Note, type Result } from '../result/result.ts';
import { baselineNoise, isWhole, quantisationStep } from './baseline-noise.ts';
import { median } from '../numeric/robust.ts';
import { findClipping } from './clipping.ts';
import type { CorrectedRecording, NoiseModel } from './corrected-recording.ts';
import { noiseCorrelation, type NoiseCorrelation } from './noise-correlation.ts';

/** Noise at lag 2 over noise at lag 1, above which smoothing is suspected: 1 for white noise, good to 4 %. */
const leastLagRatio = 1.15;

/**
 * Removes the dark frame (or the offset of the bench file), builds the noise model and marks clipped pixels.
 *
 * With a gain the variance in counts^2 is [read^2/g + signal + dark - offset]/g + 1/12 (integer counts) plus the
 * noise of the dark frame itself. Without a gain the fixed part is measured on the recording and the part that
 * grows with the signal is left to the line fit, which measures it on the lines.
 *
 * @source [EMVA2021] linear camera model (variance against mean signal)
 * @check  test/unit/noise/correct-recording.test.ts
 */
export function correctRecording(
  recording: Recording,
  dark: Recording | null,
  bench: Bench,
): Result<CorrectedRecording> {
  const { signal, wavelengthNm } = recording;
  const n = signal.length;
  if (dark !== null && dark.signal.length !== n) {
    return fail({
      code: 'dark.length',
      subject: 'dark',
      fileName: dark.name,
      lineNumber: null,
      expected: `${String(n)} points as in "${recording.name}"`,
      found: `${String(dark.signal.length)} points`,
      remedy: 'Record the dark with the same spectrometer settings, or leave it out.',
    });
  }
  const notes: Note[] = [];
  const detector = bench.detector ?? {};
  const isDensity = detector.signal === 'energy';
  const gain = isDensity ? null : (detector.gainElectronsPerCount ?? null);
  const offset = detector.offsetCounts ?? 0;
  const netSignal = new Float64Array(n);
  for (let i = 0; i < n; i++) netSignal[i] = signal[i]! - (dark === null ? offset : dark.signal[i]!);

  const baseline = measureBaseline(signal);
  const stated = buildNoiseModel({ recording, dark, bench, gain, baselineSigma: baseline.sigma, notes });
  const noise = baseline.correlation.length === 0 ? stated : correlatedNoise(stated, netSignal, baseline);
  if (baseline.correlation.length > 0) {
    notes.push({
      code: 'noise-correlated',
      text: `Neighbouring points share their noise over ${String(baseline.correlation.length + 1)} points (the export looks smoothed or oversampled); the uncertainties allow for it.`,
    });
  }
  const step = quantisationStep(signal);
  const clipping = findClipping({
    signal,
    saturationCounts: detector.saturationCounts ?? null,
    quantisationStep: step,
    baselineSigma: baseline.sigma,
    variancePerSignal: noise.variancePerSignal,
    neighbourCorrelation: baseline.correlation[0] ?? 0,
  });
  if (dark === null) {
    notes.push(
      detector.offsetCounts === undefined
        ? {
            code: 'dark-missing',
            text: 'No dark was given: a straight baseline under each line stands in for it.',
          }
        : {
            code: 'dark-offset',
            text: 'No dark was given: the offset of the bench file was removed instead.',
          },
    );
  }
  return ok({
    name: recording.name,
    sha256: recording.sha256,
    medium: recording.medium,
    wavelengthNm,
    edgeNm: pixelEdges(wavelengthNm),
    netSignal,
    clipped: clipping.clipped,
    clipLevel: clipping.level,
    noise,
    signalKind: isDensity ? 'per-nm' : 'per-pixel',
    darkUsed: dark !== null ? 'frame' : detector.offsetCounts === undefined ? 'none' : 'offset',
    notes,
  });
}

/** What the recording's own quiet parts say; correlation is looked for where lag 2 is noisier than lag 1. */
function measureBaseline(signal: Float64Array): NoiseCorrelation {
  const white = baselineNoise(signal);
  if (white.lagRatio < leastLagRatio) return { sigma: white.sigma, correlation: [], runningMeanPoints: 1 };
  const found = noiseCorrelation(signal);
  return { ...found, sigma: Math.max(white.sigma, found.sigma) };
}

/**
 * Smoothing takes noise out of every point, and the same share at every light: a noise model of the bare detector is
 * scaled to what the baseline shows.
 */
function correlatedNoise(
  stated: NoiseModel,
  netSignal: Float64Array,
  { sigma, correlation, runningMeanPoints }: NoiseCorrelation,
): NoiseModel {
  if (stated.origin === 'estimated') return { ...stated, correlation, runningMeanPoints };
  const expected = median(
    netSignal.map((value, i) => stated.fixedVariance[i]! + stated.variancePerSignal * Math.max(0, value)),
  );
  const share = runningMeanPoints > 1 ? 1 / runningMeanPoints : Math.min(1, (sigma * sigma) / expected);
  return {
    ...stated,
    fixedVariance: stated.fixedVariance.map((value) => value * share),
    variancePerSignal: stated.variancePerSignal * share,
    correlation,
    runningMeanPoints,
  };
}

interface NoiseInput {
  readonly recording: Recording;
  readonly dark: Recording | null;
  readonly bench: Bench;
  readonly gain: number | null;
  readonly baselineSigma: number;
  readonly notes: Note[];
}

function buildNoiseModel({ recording, dark, bench, gain, baselineSigma, notes }: NoiseInput): NoiseModel {
  const n = recording.signal.length;
  const detector = bench.detector ?? {};
  const measured = baselineSigma * baselineSigma;
  if (gain === null || detector.readNoiseElectrons === undefined) {
    notes.push({
      code: 'noise-estimated',
      text: `The noise was estimated from the recording itself (${gain === null ? 'no gain' : 'no read noise'} in the bench file).`,
    });
    return {
      // The recording's own scatter already holds read noise and dark current, but not the dark frame's share.
      fixedVariance: new Float64Array(n).fill(
        measured + (dark === null ? 0 : squared(baselineNoise(dark.signal).sigma)),
      ),
      variancePerSignal: gain === null ? 0 : 1 / gain,
      signalReference: 'baseline',
      origin: 'estimated',
      gainElectronsPerCount: gain,
      correlation: [],
      runningMeanPoints: 1,
    };
  }
  const readCounts = detector.readNoiseElectrons / gain;
  const single = readCounts * readCounts + (isWhole(recording.signal) ? 1 / 12 : 0);
  const fixedVariance = new Float64Array(n);
  // An averaged dark is quieter than one frame: its own scatter says by how much, and one frame is the most it can be.
  const darkScatter = dark === null ? 0 : squared(baselineNoise(dark.signal).sigma);
  for (let i = 0; i < n; i++) {
    const darkCurrent =
      dark === null || detector.offsetCounts === undefined
        ? 0
        : Math.max(0, dark.signal[i]! - detector.offsetCounts) / gain;
    const frame = single + darkCurrent;
    fixedVariance[i] = frame + Math.min(darkScatter, frame);
  }
  return {
    fixedVariance,
    variancePerSignal: 1 / gain,
    signalReference: 'zero',
    origin: 'bench',
    gainElectronsPerCount: gain,
    correlation: [],
    runningMeanPoints: 1,
  };
}

function pixelEdges(centreNm: Float64Array): Float64Array {
  const n = centreNm.length;
  const edge = new Float64Array(n + 1);
  for (let i = 1; i < n; i++) edge[i] = 0.5 * (centreNm[i - 1]! + centreNm[i]!);
  edge[0] = centreNm[0]! - (edge[1]! - centreNm[0]!);
  edge[n] = centreNm[n - 1]! + (centreNm[n - 1]! - edge[n - 1]!);
  return edge;
}

const squared = (value: number): number => value * value;
