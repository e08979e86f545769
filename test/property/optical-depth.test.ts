import { describe, expect, test } from 'vitest';
import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import type { CorrectedRecording } from '../../shared-core/noise/corrected-recording.ts';
import { measureByAbsorption } from '../../shared-core/optical-depth/absorption.ts';
import type { OpticalDepthFinding } from '../../shared-core/optical-depth/finding.ts';
import { measureWithMirror } from '../../shared-core/optical-depth/mirror.ts';
import { observeLine, type ObservedLine } from '../../shared-core/optical-depth/observed-line.ts';
import { hydrogenLine, type HydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { lorentzianBeforehandNm } from '../../shared-core/physics/line-widths.ts';
import { starkWidthOfLine } from '../../shared-core/physics/stark.ts';
import { asRecording } from '../support/diagnose-simulated.ts';
import { drawPair, pairDetector, pairMeans, type PairMeans } from '../support/simulate-pair.ts';

const lamp = { gasTemperatureK: 800 };
const draws = 200;

interface Case {
  readonly column: number;
  readonly electronsPerCubicMetre: number;
  readonly instrumentFwhmNm: number;
  /** Electrons of H-alpha in a thin tube. */
  readonly brightest: number;
  /** The highest lines as well; where lines are wide they would lie in each other's windows. */
  readonly hasHighLines?: boolean;
}

function prepare({
  column,
  electronsPerCubicMetre,
  instrumentFwhmNm,
  brightest,
  hasHighLines = true,
}: Case): {
  means: PairMeans;
  lines: ObservedLine[];
} {
  const lorentzNm = (line: HydrogenLine): number =>
    lorentzianBeforehandNm(line, lamp) + starkWidthOfLine(line.upperLevel, electronsPerCubicMetre);
  const means = pairMeans({
    column,
    gasKelvin: 800,
    lorentzNm,
    instrumentFwhmNm,
    thinElectrons: ({ upperLevel }) =>
      brightest * (hasHighLines ? [1, 0.25, 0.1, 0.05, 0.03] : [1, 0.25, 0.1, 0, 0])[upperLevel - 3]!,
    continuumElectrons: 100,
    mirrorGain: 0.8,
    sourceElectrons: 200_000,
  });
  const around = {
    recording: corrected(means, means.alone),
    clipped: new Uint8Array(means.wavelengthNm.length),
    foreignNm: [],
    hydrogenNm: [],
    instrumentFwhmNm,
  };
  const gas = { best: { lamp, electronsPerCubicMetre, deuteriumRatio: 0 }, others: [] };
  const lines = [3, 4, 5, 6, 7].map((level) => {
    const line = hydrogenLine(level);
    const place = {
      line,
      centreNm: line.wavelengthAirNm,
      fwhmNm: Math.sqrt((instrumentFwhmNm + lorentzNm(line)) ** 2 + 0.46 * 0.09 ** 2),
      isotopeShiftNm: 0,
      blendedWith: null,
    };
    const observed = observeLine(place, around, gas);
    if (typeof observed === 'string') throw new Error(observed);
    return observed;
  });
  return { means, lines };
}

function corrected({ wavelengthNm }: PairMeans, counts: Float64Array): CorrectedRecording {
  const result = correctRecording(asRecording(wavelengthNm, counts), null, { detector: pairDetector });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}

/** Findings of every draw, by method and line. */
function drawAll(given: Case): { means: PairMeans; found: Map<string, OpticalDepthFinding[]> } {
  const { means, lines } = prepare(given);
  const found = new Map<string, OpticalDepthFinding[]>();
  for (let seed = 0; seed < draws; seed++) {
    const pair = drawPair(means, 1000 + seed);
    const [alone, mirror, source, through] = [pair.alone, pair.mirror, pair.source, pair.through].map(
      (counts) => corrected(means, counts),
    ) as [CorrectedRecording, CorrectedRecording, CorrectedRecording, CorrectedRecording];
    for (const finding of [
      ...measureWithMirror(lines, alone, mirror, 1 / pairDetector.gainElectronsPerCount, 0.95),
      ...measureByAbsorption(
        lines,
        { discharge: alone, source, through },
        1 / pairDetector.gainElectronsPerCount,
        0.95,
      ),
    ]) {
      const key = `${finding.method} ${finding.lineId}`;
      found.set(key, [...(found.get(key) ?? []), finding]);
    }
  }
  return { means, found };
}

const cases: readonly (readonly [string, Case])[] = [
  [
    'a thick tube, bench instrument',
    { column: 3e16, electronsPerCubicMetre: 1e19, instrumentFwhmNm: 0.18, brightest: 300_000 },
  ],
  [
    'a tube of depth one, bench instrument',
    { column: 1e16, electronsPerCubicMetre: 1e19, instrumentFwhmNm: 0.18, brightest: 100_000 },
  ],
  [
    'lines as wide as a pixel',
    { column: 5e16, electronsPerCubicMetre: 1e21, instrumentFwhmNm: 0.02, brightest: 300_000 },
  ],
  [
    'wide lines, resolved',
    {
      column: 1.3e17,
      electronsPerCubicMetre: 1.5e22,
      instrumentFwhmNm: 0.02,
      brightest: 300_000,
      hasHighLines: false,
    },
  ],
];

describe.each(cases)('%s', (_name, given) => {
  const { means, found } = drawAll(given);
  const truth = means.peakDepth.get('H-alpha')!;

  test.each(['mirror', 'absorption'])(
    '%s: the interval of H-alpha holds the truth as often as it says',
    (method) => {
      const all = found.get(`${method} H-alpha`)!;
      const measured = all.filter(({ status }) => status === 'measured');
      expect(measured.length).toBe(draws);
      const covered = measured.filter(
        ({ opticalDepth: { low, high } }) => low! <= truth && (high === null || truth <= high),
      );
      // 200 draws: the standard error of 95 % is 1.5 %.
      expect(covered.length / draws).toBeGreaterThanOrEqual(0.92);
      expect(covered.length / draws).toBeLessThanOrEqual(0.98);
    },
  );

  test('says whether the instrument resolves H-alpha, and gives its profile', () => {
    for (const method of ['mirror', 'absorption']) {
      const { isResolved, profile } = found.get(`${method} H-alpha`)![0]!;
      expect(isResolved).toBe(given.electronsPerCubicMetre > 1e22);
      if (!isResolved) continue;
      const centre = profile.reduce((so, next) =>
        Math.abs(next.offsetNm) < Math.abs(so.offsetNm) ? next : so,
      );
      expect(Math.abs(centre.opticalDepth - truth)).toBeLessThan(0.1 * truth + 3 * centre.sigma);
      expect(profile.length).toBeGreaterThanOrEqual(3);
    }
  });

  test.each(['mirror', 'absorption'])('%s: depth, column and area factor are unbiased', (method) => {
    const all = found.get(`${method} H-alpha`)!;
    const mean = (of: (finding: OpticalDepthFinding) => number): number =>
      all.reduce((sum, finding) => sum + of(finding), 0) / draws;
    const half = mean(({ opticalDepth: { low, high } }) => (high! - low!) / 2);
    // A quarter of the standard uncertainty.
    expect(Math.abs(mean(({ opticalDepth }) => opticalDepth.value!) - truth)).toBeLessThan(0.13 * half);
    const columnHalf = (half / truth) * given.column;
    expect(
      Math.abs(mean(({ columnPerSquareMetre }) => columnPerSquareMetre.value!) - given.column),
    ).toBeLessThan(0.13 * columnHalf);
    expect(Math.abs(mean(({ areaFactor }) => areaFactor!) - means.escape.get('H-alpha')!)).toBeLessThan(0.01);
  });

  test('the column of H-alpha predicts what the other lines lose, by f lambda^2', () => {
    for (const id of ['H-beta', 'H-gamma']) {
      const limits = found.get(`mirror ${id}`)!.filter(({ status }) => status === 'upper-limit');
      for (const { areaFactor } of limits)
        expect(Math.abs(areaFactor! - means.escape.get(id)!)).toBeLessThan(0.03);
    }
  });

  test('limits hold the truth', () => {
    for (const [key, findings] of found) {
      const depth = means.peakDepth.get(key.split(' ')[1]!)!;
      const limits = findings.filter(({ status }) => status === 'upper-limit');
      if (limits.length < 0.9 * draws) continue;
      const held = limits.filter(({ opticalDepth }) => opticalDepth.high! >= depth);
      expect(held.length / limits.length, key).toBeGreaterThanOrEqual(0.92);
    }
  });
});

describe('a thin tube', () => {
  const { found } = drawAll({
    column: 1e10,
    electronsPerCubicMetre: 1e19,
    instrumentFwhmNm: 0.18,
    brightest: 100_000,
  });

  test.each(['mirror', 'absorption'])(
    '%s: H-alpha gets a limit, and is called absorbed in one draw of twenty at most',
    (method) => {
      const all = found.get(`${method} H-alpha`)!;
      expect(all.filter(({ status }) => status === 'measured').length).toBeLessThanOrEqual(10);
      const limits = all.filter(({ status }) => status === 'upper-limit');
      expect(limits.length).toBeGreaterThanOrEqual(185);
      for (const { opticalDepth } of limits) {
        expect(opticalDepth.value).toBeNull();
        expect(opticalDepth.high!).toBeGreaterThan(0);
        expect(opticalDepth.high!).toBeLessThan(0.5);
      }
    },
  );

  test('a line with none thinner beside it is not determined with the mirror, and says why', () => {
    for (const { status, reason, opticalDepth } of found.get('mirror H-epsilon')!) {
      expect(status).toBe('not-determined');
      expect(reason).toContain('compare');
      expect(opticalDepth).toEqual({ value: null, low: null, high: null });
    }
  });
});
