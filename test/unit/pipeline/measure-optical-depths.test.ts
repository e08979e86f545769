import { describe, expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { buildFigures } from '../../../shared-core/diagnosis/build-figures.ts';
import { diagnosisSchema } from '../../../shared-core/diagnosis/diagnosis.ts';
import { diagnose, type DiagnoseInput } from '../../../shared-core/pipeline/diagnose.ts';
import type { Recording } from '../../../shared-core/recording/recording.ts';
import { buildHtmlReport } from '../../../shared-core/report/build-html-report.ts';
import { starkWidthOfLine } from '../../../shared-core/physics/stark.ts';
import { asRecording } from '../../support/diagnose-simulated.ts';
import { checkOf } from '../../support/run-evidence.ts';
import { drawPair, pairDetector, pairMeans } from '../../support/simulate-pair.ts';

const bench: Bench = {
  detector: { ...pairDetector, saturationCounts: 65_535 },
  instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004 },
  lamp: { gasTemperatureK: 800, pathLengthMm: 10 },
};
const means = pairMeans({
  column: 1e16,
  gasKelvin: 800,
  lorentzNm: ({ upperLevel }) => starkWidthOfLine(upperLevel, 1e19),
  instrumentFwhmNm: 0.18,
  thinElectrons: ({ upperLevel }) => 300_000 * [1, 0.25, 0.1, 0.05, 0.03][upperLevel - 3]!,
  continuumElectrons: 100,
  mirrorGain: 0.8,
  sourceElectrons: 200_000,
});
const pair = drawPair(means, 7);
const named = (part: keyof typeof pair, wavelengthNm = means.wavelengthNm): Recording => ({
  ...asRecording(wavelengthNm, pair[part]),
  name: `${part}.csv`,
});

function run(further: Partial<DiagnoseInput>) {
  return diagnose({
    recording: named('alone'),
    dark: null,
    response: null,
    bench,
    options: { leftOut: [] },
    lineTable: [],
    programVersion: '0.0.0',
    ...further,
  });
}

function diagnosed(further: Partial<DiagnoseInput>) {
  const result = run(further);
  if (!result.ok) throw new Error(JSON.stringify(result.problem));
  return result.value;
}

describe('a mirror and a source behind the tube', () => {
  const { diagnosis, evidence } = diagnosed({
    mirror: named('mirror'),
    source: named('source'),
    through: named('through'),
  });
  const of = (method: string, lineId: string) =>
    diagnosis.opticalDepths.find((each) => each.method === method && each.lineId === lineId)!;
  const truth = means.peakDepth.get('H-alpha')!;

  test('every line is answered for by both', () => {
    expect(diagnosis.opticalDepths.map(({ method, lineId }) => `${method} ${lineId}`)).toEqual(
      ['mirror', 'absorption'].flatMap((method) =>
        ['H-alpha', 'H-beta', 'H-gamma', 'H-delta', 'H-epsilon'].map((id) => `${method} ${id}`),
      ),
    );
    expect(diagnosisSchema.safeParse(diagnosis).success).toBe(true);
  });

  test.each(['mirror', 'absorption'])('%s: the depth and the column of H-alpha are found', (method) => {
    const alpha = of(method, 'H-alpha');
    expect(alpha.status).toBe('measured');
    expect(alpha.low!).toBeLessThan(truth);
    expect(alpha.high!).toBeGreaterThan(truth);
    expect(alpha.columnDensityLowPerSquareMetre!).toBeLessThan(1e16);
    expect(alpha.columnDensityHighPerSquareMetre!).toBeGreaterThan(1e16);
    expect(alpha.lowerLevelDensityPerCubicMetre!).toBeCloseTo(alpha.columnDensityPerSquareMetre! / 0.01, -12);
    expect(Math.abs(alpha.areaFactor! - means.escape.get('H-alpha')!)).toBeLessThan(0.08);
    expect(alpha.text).toMatch(method === 'mirror' ? /grows .* times/ : /pm .* in the light of the source/);
  });

  test('the other lines lose what that column takes from them', () => {
    const gamma = of('mirror', 'H-gamma');
    expect(gamma.status).toBe('upper-limit');
    expect(gamma.opticalDepth).toBeNull();
    expect(gamma.areaFactorFrom).toBe('H-alpha');
    expect(Math.abs(gamma.areaFactor! - means.escape.get('H-gamma')!)).toBeLessThan(0.02);
    expect(of('mirror', 'H-epsilon')).toMatchObject({ status: 'not-determined', low: null, high: null });
  });

  test('the check names the lines in use that are dimmed, and the emission is set beside it', () => {
    const check = checkOf(diagnosis, 'optical-depth')!;
    expect(check.verdict).toBe('use with care');
    expect(check.text).toContain('H-alpha');
    expect(check.facts['columnsAgree']).toBe(true);
    expect(diagnosis.selfAbsorption.text).toContain('Measured with a mirror');
  });

  test('files and findings stand in the report', () => {
    expect(diagnosis.inputs).toMatchObject({
      mirror: { name: 'mirror.csv' },
      source: { name: 'source.csv' },
      through: { name: 'through.csv' },
    });
    const html = buildHtmlReport({
      diagnosis,
      figures: buildFigures(evidence, diagnosis.verdict),
      cautions: [],
      generatedAt: null,
    });
    expect(html).toContain('>Optical depth</h2>');
    expect(html).toContain('through.csv');
  });
});

describe('what does not fit together', () => {
  test('nothing is measured, and nothing shown, without such recordings', () => {
    const { diagnosis } = diagnosed({});
    expect(diagnosis.opticalDepths).toEqual([]);
    expect(checkOf(diagnosis, 'optical-depth')).toBeUndefined();
    expect(diagnosis.inputs.mirror).toBeNull();
  });

  test.each(['source', 'through'] as const)('only the %s: it waits, and a note says for what', (part) => {
    const { diagnosis } = diagnosed({ [part]: named(part) });
    expect(diagnosis.opticalDepths).toEqual([]);
    expect(diagnosis.notes.join(' ')).toContain(`"${part}.csv" is not used yet`);
  });

  test('a mirror recording of another axis is refused by name', () => {
    const shifted = named(
      'mirror',
      means.wavelengthNm.map((nm) => nm + 1),
    );
    const result = run({ mirror: shifted });
    expect(result.ok ? null : result.problem).toMatchObject({
      code: 'pair.axis',
      subject: 'mirror recording',
      fileName: 'mirror.csv',
    });
  });

  test('one whose axis is off by part of a pixel is moved, and a note says so', () => {
    const shifted = named(
      'mirror',
      means.wavelengthNm.map((nm) => nm + 0.01),
    );
    const { diagnosis } = diagnosed({ mirror: shifted });
    expect(diagnosis.notes.join(' ')).toContain('"mirror.csv" was moved by up to 0.11 pixels');
    expect(diagnosis.opticalDepths).toHaveLength(5);
  });

  test('a line that the mirror recording clips is not determined', () => {
    const top = Math.max(...pair.alone) + 500;
    expect(Math.max(...pair.mirror)).toBeGreaterThan(top);
    const clipped = { ...named('mirror'), signal: pair.mirror.map((value) => Math.min(value, top)) };
    const detector = { ...pairDetector, saturationCounts: top };
    const alpha = diagnosed({ mirror: clipped, bench: { ...bench, detector } }).diagnosis.opticalDepths[0]!;
    expect(alpha).toMatchObject({ lineId: 'H-alpha', status: 'not-determined' });
    expect(alpha.text).toContain('clipped');
  });

  test('a mirror that faces another way is found out', () => {
    const alone = { ...named('alone'), name: 'mirror.csv' };
    for (const { status, text } of diagnosed({ mirror: alone }).diagnosis.opticalDepths) {
      expect(status).toBe('not-determined');
      expect(text).toMatch(/mirror|compare/);
    }
  });

  test('a recording without lines has no places to measure at', () => {
    const flat = asRecording(
      means.wavelengthNm,
      pair.source.map((_, px) => 1000 + (px % 7)),
    );
    const { diagnosis } = diagnosed({ recording: flat, mirror: named('mirror') });
    expect(diagnosis.opticalDepths).toEqual([]);
    expect(diagnosis.notes.join(' ')).toContain('No optical depth was measured');
  });
});
