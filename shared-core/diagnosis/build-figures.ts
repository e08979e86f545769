import { toRegisteredNm } from '../axis/axis-polynomial.ts';
import { log } from '../numeric/portable-math.ts';
import { normalQuantile } from '../numeric/distributions.ts';
import { isEnergyArea } from '../populations/pose-boltzmann.ts';
import { responseAt, coversNm } from '../populations/response-at.ts';
import type { Verdict } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import type { Figures, LineFigure, PopulationFigure, PopulationPoint, RecordingFigure } from './figures.ts';
import { finalAxisMap } from './registered-axis.ts';

const curvePointsPerPixel = 6;
/** A line this faint is drawn as an arrow at its upper limit. */
const pointSignificance = 2;

/** Everything the charts and the report draw, on the registered axis. */
export function buildFigures(evidence: Evidence, verdict: Verdict): Figures {
  return {
    recording: recordingFigure(evidence),
    lines: evidence.fits.windows
      .map((_, index) => lineFigure(evidence, index))
      .filter((figure) => figure !== null),
    populations: populationFigure(evidence, verdict),
  };
}

function registeredNm({ registration, fits }: Evidence, recordedNm: number): number {
  return registration.status === 'registered'
    ? toRegisteredNm(finalAxisMap(registration, fits), recordedNm)
    : recordedNm;
}

function recordingFigure(evidence: Evidence): RecordingFigure {
  const { recording, fits, registration, temperature } = evidence;
  const { wavelengthNm, netSignal, noise, clipped } = recording;
  const used = new Set(temperature.used.map((index) => fits.fits[index]!.id));
  return {
    wavelengthNm: wavelengthNm.map((nm) => registeredNm(evidence, nm)),
    signal: netSignal,
    sigma: netSignal.map((value, i) =>
      Math.sqrt(noise.fixedVariance[i]! + fits.variancePerSignal * Math.max(0, value)),
    ),
    clipped,
    signalUnit: recording.signalKind === 'per-nm' ? 'signal' : 'counts',
    windows: fits.windows.map(({ lineId, firstPx, endPx }) => ({
      lineId,
      fromNm: registeredNm(evidence, wavelengthNm[firstPx]!),
      toNm: registeredNm(evidence, wavelengthNm[endPx - 1]!),
    })),
    marks:
      registration.status === 'registered'
        ? [
            ...fits.fits.map(({ id, recordedCentreNm }) => ({
              lineId: id,
              wavelengthNm: registeredNm(evidence, recordedCentreNm),
              used: used.has(id),
            })),
            ...registration.matched
              .filter(({ id }) => fits.obstacles.has(id))
              .map(({ id, referenceNm }) => ({ lineId: id, wavelengthNm: referenceNm, used: false })),
          ]
        : [],
  };
}

function lineFigure(evidence: Evidence, windowIndex: number): LineFigure | null {
  const { recording, fits } = evidence;
  const { lineId, firstPx, endPx } = fits.windows[windowIndex]!;
  const fit = fits.fits.find(({ id }) => id === lineId);
  if (fit === undefined) return null;
  const cut = (values: Float64Array): Float64Array => values.slice(firstPx, endPx);
  const signal = cut(recording.netSignal);
  const model = cut(fits.modelled);
  const baseline = cut(fits.baseline);
  const sigma = cut(fits.pixelVariance).map(Math.sqrt);
  const count = (endPx - firstPx) * curvePointsPerPixel;
  const curveNm = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const px = firstPx + i / curvePointsPerPixel;
    const low = Math.min(recording.wavelengthNm.length - 2, Math.floor(px));
    const stepNm = recording.wavelengthNm[low + 1]! - recording.wavelengthNm[low]!;
    curveNm[i] = registeredNm(evidence, recording.wavelengthNm[low]! + (px - low) * stepNm);
  }
  return {
    lineId,
    wavelengthNm: cut(recording.wavelengthNm).map((nm) => registeredNm(evidence, nm)),
    signal,
    sigma,
    model,
    baseline,
    residualSigma: signal.map((value, i) => (value - model[i]!) / sigma[i]!),
    clipped: recording.clipped.slice(firstPx, endPx),
    curveNm,
    curve: fits.curveOf(windowIndex, curvePointsPerPixel),
  };
}

function populationFigure(evidence: Evidence, verdict: Verdict): PopulationFigure {
  const { fits, fittedLines, temperature, response, bench } = evidence;
  const used = new Set(temperature.used.map((index) => fits.fits[index]!.id));
  const points: PopulationPoint[] = [];
  for (const [index, fit] of fits.fits.entries()) {
    const line = fittedLines[index]!;
    if (response !== null && !coversNm(response, fit.referenceNm)) continue;
    const table = response === null ? null : responseAt(response, [fit.referenceNm]);
    const photons = line.upperWeight * line.transitionProbabilityPerS;
    const perPopulation =
      (table?.response[0] ?? 1) *
      (temperature.escape?.get(fit.id) ?? 1) *
      (isEnergyArea(bench) ? photons / line.wavelengthVacuumNm : photons);
    const isFaint = fit.area < pointSignificance * fit.areaSigma;
    const area = isFaint ? Math.max(0, fit.area) + pointSignificance * fit.areaSigma : fit.area;
    const relative = fit.areaSigma / area;
    const calibration = table?.relativeSigma[0] ?? 0;
    points.push({
      lineId: fit.id,
      upperLevel: fit.upperLevel,
      upperEnergyEv: line.upperEnergyEv,
      lnPopulation: area > 0 ? log(area / perPopulation) : null,
      lnPopulationSigma:
        area > 0 && !isFaint ? Math.sqrt(relative * relative + calibration * calibration) : null,
      used: used.has(fit.id) && temperature.boltzmann !== null,
      isUpperLimit: isFaint,
    });
  }
  return { points, line: populationLine(evidence), verdict };
}

function populationLine({ temperature, fittedLines }: Evidence): PopulationFigure['line'] {
  if (temperature.boltzmann === null) return null;
  const { line } = temperature.boltzmann;
  const energies = temperature.used.map((index) => fittedLines[index]!.upperEnergyEv);
  const from = Math.min(...energies) - 0.08;
  const to = Math.max(...energies) + 0.08;
  const count = 41;
  const z = temperature.widening * normalQuantile(0.5 * (1 + temperature.coverage));
  const energyEv = new Float64Array(count);
  const lnPopulation = new Float64Array(count);
  const low = new Float64Array(count);
  const high = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const energy = from + ((to - from) * i) / (count - 1);
    const value = line.intercept + line.slope * energy;
    const half =
      z *
      Math.sqrt(
        Math.max(
          0,
          line.interceptVariance + 2 * energy * line.covariance + energy * energy * line.slopeVariance,
        ),
      );
    energyEv[i] = energy;
    lnPopulation[i] = value;
    low[i] = value - half;
    high[i] = value + half;
  }
  return { energyEv, lnPopulation, low, high };
}
