import { toRecordedNm } from '../axis/axis-polynomial.ts';
import { pseudoVoigtInstrument } from '../instrument/instrument-term.ts';
import { gaussianFwhmPerSigma } from '../numeric/voigt-run.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import { atomicMassU } from '../physics/constants.ts';
import { fineStructureComponents } from '../physics/fine-structure.ts';
import { hydrogenLine, seriesLine, type HydrogenLine } from '../physics/hydrogen.ts';
import { defaultGasTemperatureK, lorentzianBeforehandNm } from '../physics/line-widths.ts';
import { starkWidthRelativeToHBeta } from '../physics/stark.ts';
import type { Additions } from './additions.ts';
import type { ExpectedWidths, PlacedLine, WindowPlan } from './choose-windows.ts';
import {
  fixedAt,
  free,
  instrumentIndex,
  starkIndex,
  type Belief,
  type JointLine,
  type JointProblem,
  type Stick,
} from './joint-problem.ts';
import type { FitLinesInput } from './solved-fit.ts';

/** How far a single line may depart from the shared laws, 1 sigma. */
const departures = Object.freeze({
  /** Share of the instrument width by which a line may lie off the straight axis when the bench states no axis sigma. */
  centreShare: 0.15,
  ownCentreShare: 0.5,
  ownWidth: 0.4,
  ownStark: 0.5,
});
/** A bench that states a width but no uncertainty for it is trusted to 3 %. */
const assumedWidthUncertainty = 0.03;
/** A width read off the recording's narrowest line holds whatever broadens that line: it only roughly bounds the instrument's. */
const unknownWidthUncertainty = 0.3;
/** K: what is believed of a gas temperature that the bench does not state, where the widths can tell. */
const gasTemperatureSpreadK = 1500;

/** What each line may have of its own: the shared laws with small departures, or its own width and place. */
export type Sharing = 'shared' | 'own';

export function poseProblem(
  { recording, registration, bench, instrumentTerms }: FitLinesInput,
  plan: WindowPlan,
  widths: ExpectedWidths,
  sharing: Sharing,
  additions: Additions,
): JointProblem {
  const instrument = instrumentBelief(bench.instrument, widths);
  const hosts = plan.lines.map((line) => ({ ...line, ...departuresOf(line, bench, widths, sharing) }));
  const companionAt = hosts.length;
  return {
    recording,
    masked: plan.masked,
    lines: [...hosts, ...additions.companions.map(({ line }) => line)],
    segments: plan.segments.map((segment) => ({
      ...segment,
      lines: [
        ...segment.lines,
        ...additions.companions.flatMap(({ hostId }, index) =>
          segment.lines.some((line) => hosts[line]!.id === hostId) ? [companionAt + index] : [],
        ),
      ],
    })),
    instrumentShape: instrumentTerms ?? pseudoVoigtInstrument(bench.instrument?.lorentzShare ?? 0),
    pivotNm: registration.map.pivotNm,
    variancePerSignal: recording.noise.variancePerSignal,
    relativeMisfit: 0,
    beliefs: {
      offsetNm: { mean: 0, sigma: widths.instrumentNm },
      stretch: plan.lines.length < 2 ? fixedAt(0) : { mean: 0, sigma: 0.002 },
      instrumentFwhmNm: instrument,
      starkFwhmNm: free,
      gasKelvin: gasBelief(bench.lamp?.gasTemperatureK, instrument),
      deuteriumRatio: additions.deuterium ? free : fixedAt(0),
      baselineCurvature: plan.segments.map((_, index) =>
        additions.curvedSegments.has(index) ? free : fixedAt(0),
      ),
    },
    expected: null,
    start: new Map([
      [instrumentIndex, widths.instrumentNm],
      [starkIndex, widths.starkNm],
    ]),
  };
}

function instrumentBelief(stated: FitLinesInput['bench']['instrument'], widths: ExpectedWidths): Belief {
  const known = stated?.fwhmNm;
  return known === undefined
    ? { mean: widths.instrumentNm, sigma: unknownWidthUncertainty * widths.instrumentNm }
    : { mean: known, sigma: stated?.fwhmSigmaNm ?? assumedWidthUncertainty * known };
}

/**
 * Where the instrument is so narrow, and its width so well known, that Doppler widths show, the temperature is fitted;
 * elsewhere it would only repeat the instrument width.
 */
function gasBelief(statedK: number | undefined, instrument: Belief): Belief {
  if (statedK !== undefined) return fixedAt(statedK);
  const doppler = dopplerFwhmNm(hydrogenLine(3).wavelengthVacuumNm, defaultGasTemperatureK, atomicMassU.H);
  return doppler * doppler > instrument.mean * instrument.sigma
    ? { mean: defaultGasTemperatureK, sigma: gasTemperatureSpreadK }
    : fixedAt(defaultGasTemperatureK);
}

function departuresOf(
  line: JointLine,
  bench: FitLinesInput['bench'],
  widths: ExpectedWidths,
  sharing: Sharing,
): Pick<JointLine, 'centreDepartureNm' | 'starkDeparture' | 'widthDeparture'> {
  if (sharing === 'own') {
    return {
      centreDepartureNm: { mean: 0, sigma: departures.ownCentreShare * widths.instrumentNm },
      starkDeparture: { mean: 0, sigma: departures.ownStark },
      widthDeparture: { mean: 0, sigma: departures.ownWidth },
    };
  }
  return {
    centreDepartureNm: {
      mean: 0,
      sigma: bench.axis?.sigmaNm ?? departures.centreShare * widths.instrumentNm,
    },
    starkDeparture: line.starkDeparture,
    widthDeparture: fixedAt(0),
  };
}

/** Where the registration puts a line on the recorded axis, and how wide it is against H-beta. */
export function placeLine({ recording, registration }: FitLinesInput, line: HydrogenLine): PlacedLine {
  const nm = recording.medium === 'air' ? line.wavelengthAirNm : line.wavelengthVacuumNm;
  return {
    id: line.id,
    nominalCentreNm: toRecordedNm(registration.map, nm),
    starkRatio: starkWidthRelativeToHBeta(line.upperLevel, line.lowerLevel).ratio,
  };
}

/** Below this instrument width, nm, the fine structure of H-alpha (14 pm) shapes the line: its components are drawn apart. */
const fineStructureShowsBelowNm = 0.05;

/** A hydrogen line as the joint fit takes it, the deuterium line beside it included. */
export function toJointLine(input: FitLinesInput, line: HydrogenLine): JointLine {
  const { recording, search, bench } = input;
  const inMedium = (of: HydrogenLine): number =>
    recording.medium === 'air' ? of.wavelengthAirNm : of.wavelengthVacuumNm;
  const placed = placeLine(input, line);
  const deuterium = seriesLine(line.upperLevel, line.lowerLevel, 'D');
  const stark = starkWidthRelativeToHBeta(line.upperLevel, line.lowerLevel);
  const isResolved = (bench.instrument?.fwhmNm ?? search.fwhmNm) < fineStructureShowsBelowNm;
  const sticks = isResolved ? componentSticks : blendedStick;
  return {
    ...placed,
    referenceNm: inMedium(line),
    sticks: [
      ...sticks(line, 0, 1),
      ...sticks(
        deuterium,
        placeLine(input, deuterium).nominalCentreNm - placed.nominalCentreNm,
        // Light per atom in the level differs by the transition probabilities alone.
        deuterium.transitionProbabilityPerS / line.transitionProbabilityPerS,
      ),
    ],
    fixedLorentzianFwhmNm: lorentzianBeforehandNm(line, bench.lamp ?? {}),
    centreDepartureNm: fixedAt(0),
    starkDeparture: { mean: 0, sigma: stark.relativeSigma },
    widthDeparture: fixedAt(0),
  };
}

/** All fine-structure components of one isotope as one stick, their spread as a width. */
function blendedStick(line: HydrogenLine, shiftNm: number, weight: number): Stick[] {
  const fine = gaussianFwhmPerSigma * line.fineStructureRmsNm;
  return [{ ...isotopeStick(line), shiftNm, weight, fixedSquaredNm2: fine * fine }];
}

/** One stick a component. */
function componentSticks(line: HydrogenLine, shiftNm: number, weight: number): Stick[] {
  const components = fineStructureComponents(line.upperLevel, line.lowerLevel, line.isotope);
  return components.map(({ wavenumberPerCm, share }) => ({
    ...isotopeStick(line),
    shiftNm: shiftNm + 1e7 / wavenumberPerCm - line.wavelengthVacuumNm,
    weight: weight * share,
    fixedSquaredNm2: 0,
  }));
}

function isotopeStick(line: HydrogenLine) {
  let perKelvin = dopplerSquaredByLine.get(line);
  if (perKelvin === undefined) {
    const doppler = dopplerFwhmNm(line.wavelengthVacuumNm, 1, atomicMassU[line.isotope]);
    perKelvin = doppler * doppler;
    dopplerSquaredByLine.set(line, perKelvin);
  }
  return { dopplerSquaredNm2PerK: perKelvin, isDeuterium: line.isotope === 'D' };
}

/** Computed once a line. */
const dopplerSquaredByLine = new Map<HydrogenLine, number>();
