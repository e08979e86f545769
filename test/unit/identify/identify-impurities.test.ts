import { describe, expect, test } from 'vitest';
import {
  identifyImpurities,
  type FoundPeak,
  type ImpurityFinding,
} from '../../../shared-core/identify/identify-impurities.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { shippedLineTable } from '../../support/line-table.ts';

const lineTable = shippedLineTable();
const balmerLinesNm = [3, 4, 5, 6, 7, 8, 9, 10, 11, 12].map((n) => hydrogenLine(n).wavelengthAirNm);

const peak = (wavelengthNm: number, signalToNoise: number, wavelengthSigmaNm = 0.005): FoundPeak => ({
  wavelengthNm,
  signalToNoise,
  wavelengthSigmaNm,
});

function identify(
  peaks: readonly FoundPeak[],
  rangeNm: readonly [number, number] = [370, 700],
  fwhmNm = 0.18,
): readonly ImpurityFinding[] {
  return identifyImpurities({ peaks, lineTable, fwhmNm, rangeNm, balmerLinesNm });
}

const speciesOf = (findings: readonly ImpurityFinding[]): string[] => findings.map(({ species }) => species);

describe('species that are there', () => {
  test('mercury, by its visible lines', () => {
    const findings = identify([
      peak(404.66, 30),
      peak(435.83, 80),
      peak(546.08, 70),
      peak(576.97, 15),
      peak(579.06, 14),
    ]);
    expect(findings).toHaveLength(1);
    expect(findings[0]).toEqual({
      species: 'Hg',
      evidence: 'Hg I 435.83 nm, 546.08 nm, 404.66 nm, 576.96 nm and 1 more',
      signalToNoise: 80,
      meaning: 'mercury vapour (pump, lamp, switch)',
    });
  });

  test('an air leak, by the nitrogen bands, whose tops lie a little below the heads', () => {
    const findings = identify(
      [peak(337.05, 40), peak(357.62, 30), peak(380.42, 12), peak(315.88, 18), peak(353.6, 9)],
      [300, 700],
    );
    expect(speciesOf(findings)).toEqual(['N2']);
    expect(findings[0]?.evidence).toMatch(/^N2 second positive C-B \(0-0\) 337\.1 nm, \(0-1\) 357\.7 nm/);
    expect(findings[0]?.meaning).toBe('air leak');
  });

  test('sodium, as two lines or as one where the instrument cannot part them', () => {
    expect(speciesOf(identify([peak(589.0, 30), peak(589.59, 15)]))).toEqual(['Na']);
    const blended = identify([peak(589.2, 30)], [370, 700], 1.2);
    expect(blended.map(({ evidence }) => evidence)).toEqual(['possible: Na I 589.19 nm']);
  });

  test('several at once, the stronger first', () => {
    const findings = identify(
      [
        ...[peak(435.83, 25), peak(546.07, 22), peak(404.66, 10)],
        ...[peak(587.56, 60), peak(667.82, 40), peak(501.57, 12), peak(447.15, 15)],
        ...[peak(516.45, 20), peak(473.68, 9), peak(563.5, 10)],
      ],
      [370, 700],
    );
    expect(speciesOf(findings)).toEqual(['He', 'Hg', 'C2']);
  });

  test('among the lines of molecular hydrogen', () => {
    const fulcher = lineTable
      .filter(({ species }) => species === 'H2')
      .map((l) => peak(l.wavelengthAirNm, 20));
    expect(identify(fulcher)).toEqual([]);
    const withMercury = identify([...fulcher, peak(435.83, 60), peak(546.08, 50), peak(404.66, 20)]);
    expect(speciesOf(withMercury)).toEqual(['Hg']);
  });
});

describe('species that are not to be claimed', () => {
  test('a weak single line', () => {
    expect(identify([peak(435.83, 9)])).toEqual([]);
  });

  test('a single line that is only possible, and says so', () => {
    const [finding] = identify([peak(431.4, 30)]);
    expect(finding?.evidence).toBe('possible: CH A-X (0-0) 431.4 nm');
    expect(finding?.meaning).toBe('hydrocarbon contamination');
  });

  test('a minor line without the major ones', () => {
    // 407.78 and 434.75 nm are hundredths of the lines at 435.83 and 546.07 nm.
    expect(identify([peak(407.784, 30), peak(434.751, 30)])).toEqual([]);
    expect(identify([peak(420.0, 30), peak(414.13, 25), peak(405.9, 20)], [330, 700])).toEqual([]);
  });

  test('but a major line out of range, or under another peak, is not held missing', () => {
    const pair = [peak(576.96, 20), peak(579.07, 20)];
    expect(speciesOf(identify(pair))).toEqual([]);
    expect(speciesOf(identify(pair, [560, 700]))).toEqual(['Hg']);
  });

  test('hydrogen and deuterium themselves, and anything at a Balmer line', () => {
    const peaks = balmerLinesNm.map((nm) => peak(nm + 0.05, 500));
    expect(identify(peaks)).toEqual([]);
    expect(identify([peak(656.101, 30), peak(486.0, 20)])).toEqual([]);
    // Sharp enough to part deuterium from hydrogen, so that the Balmer lines do not hide it.
    const sharp = [peak(656.101, 300, 0.001), peak(486.0003, 100, 0.001), peak(433.9283, 40, 0.001)];
    expect(identify(sharp, [370, 700], 0.03)).toEqual([]);
  });

  test('one peak for two species: the better explained one has it', () => {
    // Ne I 667.828 and He I 667.815 nm share a peak; the rest is neon.
    const neon = [
      640.22, 614.31, 703.24, 607.43, 638.3, 650.65, 585.25, 659.9, 633.44, 692.95, 609.62, 626.65,
    ]
      .concat([671.7, 594.48, 616.36, 667.83])
      .map((nm) => peak(nm, 40));
    expect(speciesOf(identify(neon, [560, 720]))).toEqual(['Ne']);
  });

  test('nothing at all', () => {
    expect(identify([])).toEqual([]);
  });
});

describe('random peak lists', () => {
  /** Share of 500 random lists with any finding, and with one that is more than possible. */
  function falseAlarms(peakCount: number, fwhmNm: number, rangeNm: readonly [number, number]) {
    const random = createRandom(20_260);
    let any = 0;
    let certain = 0;
    for (let draw = 0; draw < 500; draw++) {
      const peaks = Array.from({ length: peakCount }, () =>
        peak(
          rangeNm[0] + random.uniform() * (rangeNm[1] - rangeNm[0]),
          4 * (1 / (1 - 0.95 * random.uniform())),
          0.1 * fwhmNm * random.uniform(),
        ),
      );
      const findings = identify(peaks, rangeNm, fwhmNm);
      if (findings.length > 0) any++;
      if (findings.some(({ evidence }) => !evidence.startsWith('possible'))) certain++;
    }
    return { any: any / 500, certain: certain / 500 };
  }

  test.each([
    [3, 0.18, [370, 700]],
    [10, 0.18, [370, 700]],
    [30, 0.18, [370, 700]],
    [10, 0.6, [300, 900]],
    [40, 0.6, [300, 900]],
    [10, 2, [350, 750]],
  ] as const)('of %d peaks at %d nm width rarely give a finding', (count, fwhmNm, rangeNm) => {
    const { any, certain } = falseAlarms(count, fwhmNm, rangeNm);
    // The rule promises 1 % and 5 %; three standard deviations of 500 draws are added.
    expect(certain).toBeLessThanOrEqual(0.01 + 3 * Math.sqrt((0.01 * 0.99) / 500));
    expect(any).toBeLessThanOrEqual(0.05 + 3 * Math.sqrt((0.05 * 0.95) / 500));
  });
});
