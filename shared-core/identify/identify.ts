import { exp, log } from '../numeric/portable-math.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';
import { benchFindings, type BenchFinding } from './bench-findings.ts';
import type { StrayPeaks } from './chance.ts';
import { describeClaim, type ImpurityFinding } from './describe-claim.ts';
import { emittersOf, type Emitter } from './emitters.ts';
import { isExplained, judgeEmitter, type Claim, type MeasuredEmitter } from './judge-emitter.ts';
import { measureFeature, type AxisInAir, type Measurement } from './measure-feature.ts';
import type { PlaceMeter } from './place-meter.ts';
import type { Reading } from './reading.ts';
import { unassignedPeaks, type UnassignedPeaks } from './unassigned-peaks.ts';

/** Light of another species that the line fit found under a line of hydrogen. */
export interface LightUnderHydrogen {
  /** "Hg I", "N2": the name of an emitter. */
  readonly name: string;
  readonly airNm: number;
  readonly area: number;
  readonly areaSigma: number;
}

export interface IdentifyInput {
  readonly meter: PlaceMeter;
  readonly axis: AxisInAir;
  /** nm in air of a place on the recorded axis. */
  readonly airNm: (recordedNm: number) => number;
  /** Recorded places of all peaks found, nm; those of hydrogen may be among them. */
  readonly peaksNm: readonly number[];
  readonly underHydrogen: readonly LightUnderHydrogen[];
  readonly lineTable: readonly SpectralLine[];
}

/** What else is in the tube. */
export interface Identification {
  /** Species other than hydrogen, the strongest first. */
  readonly impurities: readonly ImpurityFinding[];
  readonly unassigned: UnassignedPeaks;
  readonly findings: readonly BenchFinding[];
}

/** Chance, over all emitters looked for together, that anything is claimed of a recording that does not hold it. */
const claimChance = 0.01;
const lnClaimChance = log(claimChance);

/**
 * Which other species a recording shows.
 *
 * The light at every place of the table is measured; a species is claimed when several of its places agree, no stronger
 * one is missing, and noise and stray lines would do as well in fewer than 1 % of recordings, all species together.
 * The best explained species takes its places first; what lies under them says nothing of others.
 *
 * @source probability of several p-values together: [Zaykin2002]; many species together: Bonferroni's inequality
 * @check  test/property/identify.test.ts
 */
export function identify(input: IdentifyInput): Identification {
  const { meter, axis, underHydrogen, lineTable } = input;
  const { fwhmNm, recording } = meter;
  const { wavelengthNm } = recording;
  const measured: readonly MeasuredEmitter[] = emittersOf(lineTable, fwhmNm).map((emitter) => ({
    emitter,
    measurements: emitter.features.map((feature) =>
      withLightUnderHydrogen(measureFeature(meter, axis, feature), emitter, underHydrogen),
    ),
  }));
  const lookedFor = measured.filter(({ measurements }) => measurements.filter(isMeasured).length >= 2);
  const lnCount = log(Math.max(1, lookedFor.length));
  const peaks = strengthsOf(input);
  const spanNm = wavelengthNm[wavelengthNm.length - 1]! - wavelengthNm[0]!;
  let strays: StrayPeaks = { places: peaks, spanNm };
  let left = measured;
  const claims: Claim[] = [];
  for (;;) {
    let best: Claim | null = null;
    for (const each of left) {
      const claim = judgeEmitter(each, strays, fwhmNm);
      if (claim === null || claim.lnChance + lnCount > lnClaimChance) continue;
      if (best === null || claim.lnChance < best.lnChance) best = claim;
    }
    if (best === null) break;
    const { emitter } = best;
    const taken = left
      .find((each) => each.emitter === emitter)!
      .measurements.filter(({ status }) => status === 'seen');
    claims.push(best);
    strays = { ...strays, places: strays.places.filter((peak) => !isExplained(peak, taken, fwhmNm)) };
    left = left.filter((each) => each.emitter !== emitter).map((each) => withoutTaken(each, taken, fwhmNm));
  }
  const isClaimed = (emitter: Emitter): boolean => claims.some((claim) => claim.emitter === emitter);
  const chanceOf = ({ lnChance }: Claim): number => Math.min(1, exp(lnChance + lnCount));
  const described = claims.map((claim) => describeClaim(claim, chanceOf(claim)));
  const impurities = described
    .filter(({ species }) => species !== 'H2')
    .sort((a, b) => b.signalToNoise - a.signalToNoise);
  const unassigned = unassignedPeaks({
    peaks: strays.places,
    airNm: input.airNm,
    emitters: measured.map(({ emitter }) => emitter).filter((each) => !isClaimed(each)),
    fwhmNm,
    axisSigmaNm: axis.sigmaNm,
  });
  return {
    impurities,
    unassigned,
    findings: benchFindings({ claimed: described, measured: left, unassigned }),
  };
}

const isMeasured = ({ status }: Measurement): boolean => status === 'seen' || status === 'absent';

function withLightUnderHydrogen(
  measurement: Measurement,
  { name }: Emitter,
  underHydrogen: readonly LightUnderHydrogen[],
): Measurement {
  const light = underHydrogen.find(
    (each) => each.name === name && Math.abs(each.airNm - measurement.feature.centreNm) < 0.05,
  );
  if (light === undefined || measurement.status !== 'hidden' || !(light.area > 3 * light.areaSigma)) {
    return measurement;
  }
  return {
    ...measurement,
    status: 'seen',
    area: light.area,
    sigma: light.areaSigma,
    signalToNoise: light.area / light.areaSigma,
    isUnderHydrogen: true,
  };
}

/** Peaks clear of hydrogen with their strength by the same measure as the places of the table. */
function strengthsOf({ meter, peaksNm }: IdentifyInput): StrayPeaks['places'] {
  const out: Reading = { area: 0, sigma: 1 };
  const places: { recordedNm: number; signalToNoise: number }[] = [];
  for (const recordedNm of peaksNm) {
    if (!meter.measure(recordedNm, 'line', out)) continue;
    places.push({ recordedNm, signalToNoise: out.area / out.sigma });
  }
  return places;
}

function withoutTaken(
  { emitter, measurements }: MeasuredEmitter,
  taken: readonly Measurement[],
  fwhmNm: number,
): MeasuredEmitter {
  return {
    emitter,
    measurements: measurements.map((each) =>
      each.status !== 'out-of-range' && isExplained(each, taken, fwhmNm)
        ? { ...each, status: 'hidden' }
        : each,
    ),
  };
}
