import { emptyParts, plainChoices } from './empty-parts.ts';
import type { Check, DiagnosedLine, Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import type { Figures, LineFigure, PopulationPoint } from '../../shared-core/diagnosis/figures.ts';
import type { DiagnosedRecording } from '../../shared-core/pipeline/diagnose-files.ts';

/** A cause of uncertainty that no one number states. */
export const unstated = {
  standardUncertainty: null,
  unit: '',
  sensitivityKelvin: null,
  smallestRelative: 0.0012,
  largestRelative: 0.034,
  degreesOfFreedom: null,
};

/**
 * A made-up diagnosis with everything that the sheet can show: used lines, a clipped one, one left out, an
 * upper limit, all three verdicts. Its numbers are drawn, not computed by the chain.
 */
export function sheetFixture(leftOut: readonly string[] = [], name = 't07-0412.csv'): DiagnosedRecording {
  const wavelengthNm = Float64Array.from({ length: 3648 }, (_, k) => 370 + (k * 330) / 3647);
  const signal = wavelengthNm.map((nm, k) => lampSignal(nm) + 14 * chance(k));
  const sigma = signal.map((value) => Math.sqrt(64 + Math.max(0, value) / 5));
  const clipped = Uint8Array.from(signal, (value) => (value >= ceiling ? 1 : 0));
  const lines = lampLines.map((line) => diagnosedLine(line, leftOut));
  const windows = lampLines.map((line) => ({ lineId: line.id, fromNm: line.nm - 1.6, toNm: line.nm + 1.6 }));
  const figures: Figures = {
    recording: {
      wavelengthNm,
      signal,
      sigma,
      clipped,
      signalUnit: 'counts',
      windows,
      marks: lines.map((line) => ({ lineId: line.id, wavelengthNm: line.referenceNm, used: line.used })),
    },
    lines: windows.map((window) => lineFigure(window, { wavelengthNm, signal, sigma, clipped })),
    populations: {
      points: lines.map(populationPoint),
      line: {
        energyEv: Float64Array.from([12, 12.4, 12.8, 13.2, 13.4]),
        lnPopulation: Float64Array.from([12, 12.4, 12.8, 13.2, 13.4], (energy) => straight(energy)),
        low: Float64Array.from([12, 12.4, 12.8, 13.2, 13.4], (energy) => straight(energy) - bandAt(energy)),
        high: Float64Array.from([12, 12.4, 12.8, 13.2, 13.4], (energy) => straight(energy) + bandAt(energy)),
      },
      verdict: 'use with care',
    },
  };
  const recording: DiagnosedRecording['recording'] = {
    name,
    sha256: 'a'.repeat(64),
    wavelengthNm,
    signal,
    medium: 'air',
    understood: {
      encoding: 'utf-8',
      delimiter: 'tab',
      decimalMark: 'comma',
      headerLineCount: 13,
      columnCount: 2,
      axisColumn: 1,
      signalColumn: 2,
      axisUnit: 'angstrom',
      axisUnitFrom: 'header',
      order: 'descending',
      skippedRowCount: 0,
    },
    notes: [],
  };
  return { diagnosis: fixtureDiagnosis(name, lines, leftOut), figures, recording };
}

const ceiling = 64_000;

interface LampLine {
  readonly id: string;
  readonly level: number;
  readonly nm: number;
  readonly peak: number;
  readonly energyEv: number;
}

const lampLines: readonly LampLine[] = [
  { id: 'H-alpha', level: 3, nm: 656.279, peak: 90_000, energyEv: 12.0875 },
  { id: 'H-beta', level: 4, nm: 486.135, peak: 22_000, energyEv: 12.7485 },
  { id: 'H-gamma', level: 5, nm: 434.047, peak: 6_800, energyEv: 13.0545 },
  { id: 'H-delta', level: 6, nm: 410.173, peak: 2_500, energyEv: 13.2207 },
  { id: 'H-epsilon', level: 7, nm: 397.007, peak: 900, energyEv: 13.3209 },
];

const profile = (nm: number, line: LampLine): number => {
  const offset = (nm - line.nm) / 0.076;
  return line.peak * Math.exp((-offset * offset) / 2);
};

const lampSignal = (nm: number): number =>
  Math.min(ceiling, 60 + lampLines.reduce((sum, line) => sum + profile(nm, line), 0));

/** Repeatable noise of about unit variance: a sum of three shares of an irrational rotation. */
function chance(k: number): number {
  const share = (factor: number): number => (k * factor) % 1;
  return 2 * (share(0.618033988749) + share(0.7548776662) + share(0.5698402909) - 1.5);
}

const straight = (energyEv: number): number => -1.87 * (energyEv - 12.1);
const bandAt = (energyEv: number): number => 0.05 + 0.12 * Math.abs(energyEv - 12.9);

function diagnosedLine(line: LampLine, leftOut: readonly string[]): DiagnosedLine {
  const isClipped = line.peak > ceiling;
  const isOut = leftOut.includes(line.id);
  return {
    id: line.id,
    upperLevel: line.level,
    lowerLevel: 2,
    referenceNm: line.nm,
    recordedNm: line.nm - 1.2,
    centreNm: line.nm + 0.0021,
    centreSigmaNm: 0.0004,
    area: line.peak * 9.52,
    areaSigma: 950,
    areaUnit: 'electrons',
    signalToNoise: line.peak / 30,
    gaussianFwhmNm: 0.181,
    lorentzianFwhmNm: 0.0213,
    lorentzianFwhmSigmaNm: 0.0021,
    response: 1,
    reducedChiSquare: isClipped ? 4.12 : 1.02,
    fitStatus: 'converged',
    used: !isClipped && !isOut,
    reasons: [
      ...(isClipped ? ['7 pixels of its core are clipped, so its area is not known.'] : []),
      ...(isOut ? ['Left out by the person.'] : []),
    ],
  };
}

function lineFigure(
  window: Figures['recording']['windows'][number],
  recording: Pick<Figures['recording'], 'wavelengthNm' | 'signal' | 'sigma' | 'clipped'>,
): LineFigure {
  const from = recording.wavelengthNm.findIndex((nm) => nm >= window.fromNm);
  const to = recording.wavelengthNm.findIndex((nm) => nm > window.toNm);
  const wavelengthNm = recording.wavelengthNm.slice(from, to);
  const signal = recording.signal.slice(from, to);
  const sigma = recording.sigma.slice(from, to);
  const model = wavelengthNm.map(lampSignal);
  const curveNm = Float64Array.from({ length: 240 }, (_, k) => window.fromNm + (3.2 * k) / 239);
  return {
    lineId: window.lineId,
    wavelengthNm,
    signal,
    sigma,
    model,
    baseline: wavelengthNm.map(() => 60),
    residualSigma: signal.map((value, k) => (value - (model[k] ?? 0)) / (sigma[k] ?? 1)),
    clipped: recording.clipped.slice(from, to),
    curveNm,
    curve: curveNm.map(lampSignal),
  };
}

function populationPoint(line: DiagnosedLine, index: number): PopulationPoint {
  const energy = lampLines[index]?.energyEv ?? 13;
  return {
    lineId: line.id,
    upperLevel: line.upperLevel,
    upperEnergyEv: energy,
    lnPopulation: straight(energy) + (line.used ? 0.03 : -0.35),
    lnPopulationSigma: 0.02 + 0.03 * index,
    used: line.used,
    isUpperLimit: line.id === 'H-epsilon' && !line.used,
  };
}

const check = (id: string, verdict: Check['verdict'], text: string, remedy = ''): Check => ({
  id,
  verdict,
  facts: { pValue: 0.55, lines: 4 },
  text,
  remedy,
});

function fixtureDiagnosis(name: string, lines: DiagnosedLine[], leftOut: readonly string[]): Diagnosis {
  return {
    schema: 'lampwright.diagnosis/1',
    program: { name: 'lampwright', version: '0.1.0' },
    recording: { name, sha256: 'a'.repeat(64), pointCount: 3648, firstNm: 370, lastNm: 700, medium: 'air' },
    inputs: {
      bench: 'Bench 3',
      dark: { name: 'dark.csv', sha256: 'b'.repeat(64) },
      response: { name: 'response.csv', sha256: 'c'.repeat(64), per: 'photon' },
      profile: null,
      mirror: null,
      source: null,
      through: null,
    },
    options: {
      upperLevels: [3, 4, 5, 6, 7],
      leftOut: [...leftOut],
      coverage: 0.95,
      deuterium: 'auto',
      ...plainChoices,
    },
    axis: {
      status: 'registered',
      offsetNm: 1.2,
      offsetSigmaNm: 0.0006,
      stretch: 0.003,
      stretchSigma: 1e-5,
      pivotNm: 535,
      matchedLines: lines.map((line) => line.id),
      text: 'Axis moved by 1.200 nm and stretched by 0.30 %, from five Balmer lines.',
    },
    lines,
    temperature: {
      status: 'measured',
      kelvin: 6210,
      sigmaKelvin: 95,
      lowKelvin: 6030,
      highKelvin: 6401,
      coverage: 0.95,
      chiSquare: 2.1,
      degreesOfFreedom: 2,
      effectiveDegreesOfFreedom: null,
      birgeRatio: null,
      widening: 1,
      responseCorrected: true,
      text: 'From the slope of four populations between 12.7 and 13.3 eV.',
    },
    electronDensity: {
      status: 'measured',
      perCubicMetre: 4.1e20,
      lowPerCubicMetre: 3.2e20,
      highPerCubicMetre: 5.1e20,
      coverage: 0.95,
      line: 'H-beta',
      text: 'From the Stark width of H-beta after instrument and Doppler parts.',
    },
    meaning: {
      kind: 'distribution-temperature',
      lowestEquilibratedLevel: null,
      text: 'It describes the populations of these levels and nothing more.',
    },
    ...emptyParts,
    impurities: [
      {
        species: 'N2',
        emitter: 'N2',
        evidence: 'N2 second positive C-B (0-0) 337.1 nm, (0-1) 357.7 nm; 2 of 2 bandheads in range',
        signalToNoise: 14,
        meaning: 'air leak',
        linesSeen: 2,
        linesExpected: 2,
        chanceProbability: 2e-7,
        confidence: 'sure',
      },
    ],
    benchFindings: [
      {
        id: 'air-leak',
        title: 'Air leak',
        confidence: 'likely',
        evidenceFor: ['N2 second positive C-B (0-0) 337.1 nm (sure)'],
        evidenceAgainst: ['OH at 306 to 309 nm recorded and not seen, as in dry nitrogen without oxygen.'],
        wouldSettle: ['Close the tube off and watch the pressure rise.'],
      },
    ],
    unassignedPeaks: {
      count: 2,
      nearBalmerCount: 1,
      strongest: [{ wavelengthNm: 589.21, signalToNoise: 12, candidates: ['Na I 589.19 nm'] }],
    },
    checks: [
      check('population-straightness', 'sound', 'The populations lie on a straight line.'),
      check(
        'clipping',
        'use with care',
        'H-alpha is clipped in 7 pixels.',
        'Take a second, shorter exposure.',
      ),
      check('energy-span', 'not defensible', 'The used levels span 0.6 eV.', 'Record H-alpha unclipped.'),
      check('axis', 'sound', 'The axis was moved by 1.2 nm.'),
    ],
    budget: [
      {
        source: 'noise',
        sigmaKelvin: 48,
        share: 0.26,
        remedy: 'Ten times the exposure makes it 33 K.',
        ...unstated,
      },
      {
        source: 'spectral response',
        sigmaKelvin: 80,
        share: 0.71,
        remedy: 'Response to 1 % makes it 60 K.',
        ...unstated,
      },
      { source: 'axis', sigmaKelvin: 16, share: 0.03, remedy: '', ...unstated },
    ],
    verdict: 'use with care',
    verdictText:
      'H-alpha is clipped and was left out, so the levels span only 0.6 eV: take a second, shorter exposure.',
    notes: ['Gain and read noise are those of the bench file.'],
  };
}
