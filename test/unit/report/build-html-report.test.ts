import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { buildHtmlReport, type ReportInput } from '../../../shared-core/report/build-html-report.ts';
import { reportStyle, reportStyleHash } from '../../../shared-core/report/report-style.ts';
import { cautionsFor, notASafetyDevice } from '../../../shared-core/safety/cautions.ts';
import { elementsOf, readMarkup, visibleText } from '../../support/check-markup.ts';
import { sheetFixture } from '../../support/sheet-fixture.ts';
import { unstated } from '../../support/sheet-fixture.ts';

const bench: Bench = {
  name: 'Bench 3',
  lamp: { id: 'T-07', gas: 'H2', pressurePa: 300 },
  supply: { openCircuitVolts: 5000, capacitanceMicrofarads: 0.02 },
};
const fixture = sheetFixture();

function reportOf(changes: Partial<Diagnosis> = {}, input: Partial<ReportInput> = {}): string {
  return buildHtmlReport({
    diagnosis: { ...fixture.diagnosis, ...changes },
    figures: fixture.figures,
    cautions: cautionsFor(bench),
    bench,
    generatedAt: '2026-12-01T06:50:00.000Z',
    ...input,
  });
}

/** What a reader sees, with thin spaces as blanks and runs of blanks as one. */
function readerText(html: string): string {
  return visibleText(readMarkup(html)).replace(/[\s\u202f]+/g, ' ');
}

const refused: Partial<Diagnosis> = {
  verdict: 'not defensible',
  temperature: {
    ...fixture.diagnosis.temperature,
    status: 'not-determined',
    kelvin: null,
    sigmaKelvin: null,
    lowKelvin: null,
    highKelvin: null,
    text: 'Not determined: only one line can be used.',
  },
  budget: [],
};

describe('buildHtmlReport', () => {
  it('is well formed HTML with one style, no script, nothing to load', () => {
    const html = reportOf();
    const all = [...elementsOf(readMarkup(html))];
    const names = new Set(all.map(({ name }) => name));
    for (const banned of ['script', 'link', 'img', 'iframe', 'object', 'form', 'a'])
      expect(names).not.toContain(banned);
    expect(all.filter(({ name }) => name === 'style')).toHaveLength(1);
    for (const { attributes } of all)
      for (const [key, value] of attributes) {
        expect(key).not.toMatch(/^on|^style$|href|src/);
        if (key !== 'xmlns') expect(value).not.toMatch(/https?:/);
      }
    expect(reportStyle).not.toMatch(/url\(|@import/);
  });

  it('carries a policy that allows its own style by hash and nothing else', () => {
    const policy = [...elementsOf(readMarkup(reportOf()))]
      .find(({ attributes }) => attributes.get('http-equiv') === 'Content-Security-Policy')
      ?.attributes.get('content');
    const hash = createHash('sha256').update(reportStyle).digest('base64');
    expect(reportStyleHash).toBe(hash);
    expect(policy).toBe(
      `default-src 'none'; style-src 'sha256-${hash}'; base-uri 'none'; form-action 'none'`,
    );
  });

  it('is byte for byte the same for the same input', () => {
    const again = sheetFixture();
    expect(reportOf(again.diagnosis, { figures: again.figures })).toBe(reportOf());
  });

  it('puts the verdict before the numbers and the numbers before the evidence', () => {
    const text = readerText(reportOf());
    const order = ['use with care', '6 210 K', '4.1 × 10²⁰ m⁻³', 'The recording', 'The lines', 'The populations',
      'Can it be trusted?', 'What limits it?', 'What else is in the tube?', 'Notes', 'How each number was obtained',
      'Program, inputs and settings', 'Cautions for this bench', 'Signatures']; // prettier-ignore
    const places = order.map((part) => text.indexOf(part));
    expect(
      places.every((place) => place >= 0),
      order[places.indexOf(-1)],
    ).toBe(true);
    expect(places).toEqual([...places].sort((a, b) => a - b));
  });

  it('names the recording, lamp, bench, program and the SHA-256 of every input', () => {
    const text = readerText(reportOf());
    for (const part of [
      't07-0412.csv',
      'Lamp T-07',
      'Bench 3',
      'lampwright 0.1.0',
      'dark.csv',
      'response.csv',
      'a'.repeat(64),
      'b'.repeat(64),
      'c'.repeat(64),
      '2026-12-01T06:50:00.000Z',
    ])
      // prettier-ignore
      expect(text, part).toContain(part);
  });

  it('lists the checks worst first, with what to do', () => {
    const text = readerText(reportOf());
    expect(text.indexOf('The used levels span')).toBeLessThan(text.indexOf('H-alpha is clipped in 7'));
    expect(text.indexOf('H-alpha is clipped in 7')).toBeLessThan(text.indexOf('lie on a straight line'));
    expect(text).toContain('Take a second, shorter exposure.');
  });

  it('shows the budget with the largest source first', () => {
    const text = readerText(reportOf());
    const from = text.indexOf('What limits it?');
    expect(text.indexOf('spectral response', from)).toBeLessThan(text.indexOf('noise', from));
  });

  it('prints every caution and the standing sentence', () => {
    const text = readerText(reportOf());
    expect(text).toContain(notASafetyDevice);
    for (const caution of cautionsFor(bench)) expect(text, caution.id).toContain(caution.text);
    expect(text).toContain('IEC 61010-1');
  });

  it('cites only what the diagnosis used', () => {
    const whole = readerText(reportOf());
    for (const source of [
      'Gigosos',
      'Menzel',
      'Wiese',
      'Weideman',
      'Olivero',
      'Ciddor',
      'Kramida',
      'JCGM 100',
    ])
      expect(whole, source).toContain(source);
    const without = readerText(
      reportOf({
        ...refused,
        electronDensity: { ...fixture.diagnosis.electronDensity, status: 'not-determined' },
      }),
    );
    expect(without).not.toContain('Gigosos');
    expect(without).not.toContain('Menzel');
    expect(without).toContain('Weideman');
  });
});

describe('numbers the data do not support', () => {
  it('prints no kelvin at all when the temperature is not determined', () => {
    const text = readerText(reportOf(refused, { bench: { name: 'Bench 3' } }));
    expect(text).toContain('not determined');
    expect(text).not.toMatch(/\d K\b/);
  });

  it('states the budget as a table with its sum, and the Monte Carlo check where it was made', () => {
    const lamp = {
      source: 'temperature of the standard lamp',
      sigmaKelvin: 23,
      share: 0.9942,
      remedy: '',
      standardUncertainty: 10,
      unit: 'K',
      sensitivityKelvin: 2.3,
      smallestRelative: 0.0012,
      largestRelative: 0.034,
      degreesOfFreedom: null,
    };
    const noise = {
      ...lamp,
      ...unstated,
      source: 'noise',
      sigmaKelvin: 1.75,
      share: 0.0058,
      degreesOfFreedom: 147,
    };
    const monteCarlo: Diagnosis['monteCarlo'] = {
      seed: 1,
      trials: 20_000,
      isStable: true,
      kelvin: 6210,
      medianKelvin: 6209,
      sigmaKelvin: 95,
      lowKelvin: 6031,
      highKelvin: 6400,
      coverage: 0.95,
      skewness: 0.01,
      confirmsFirstOrder: true,
      text: '20000 Monte Carlo trials confirm the first-order interval (6031 to 6400 K).',
    };
    const temperature = { ...fixture.diagnosis.temperature, effectiveDegreesOfFreedom: 12.7 };
    const read = readerText(reportOf({ budget: [noise, lamp], monteCarlo, temperature }));
    expect(read).toContain('temperature of the standard lamp 10 K 0.12 to 3.4 % 2.3 K per K 23 99 % ∞');
    expect(read).toContain('noise by line 0.12 to 3.4 % – 1.8 0.58 % 147');
    // Student's t for 12 degrees of freedom at 95 %: 2.18 (JCGM 100:2008, table G.2).
    expect(read).toContain('12 effective degrees of freedom, so the interval of 1/T reaches 2.18');
    expect(read).toContain('confirm the first-order interval (6031 to 6400 K). Seed 1.');
    expect(read).toContain('JCGM 101:2008');
    expect(readerText(reportOf({ ...refused, monteCarlo }))).not.toContain('6031');
  });

  it('withholds a fitted number under the verdict "not defensible", in the budget too', () => {
    const text = readerText(reportOf({ verdict: 'not defensible' }));
    expect(text).not.toMatch(/\d K\b/);
    expect(text).toContain('withheld');
    expect(text).toContain('71 %');
  });

  it('prints limits as limits', () => {
    const text = readerText(
      reportOf({
        temperature: {
          ...fixture.diagnosis.temperature,
          status: 'lower-limit',
          kelvin: null,
          sigmaKelvin: null,
          lowKelvin: 9412,
          highKelvin: null,
          text: '',
        },
        electronDensity: {
          ...fixture.diagnosis.electronDensity,
          status: 'upper-limit',
          perCubicMetre: null,
          lowPerCubicMetre: null,
          highPerCubicMetre: 3.11e19,
        },
      }),
    );
    expect(text).toContain('> 9 400 K');
    expect(text).toContain('lower limit, 95 % coverage');
    expect(text).toContain('< 3.2 × 10¹⁹ m⁻³');
    expect(text).not.toContain('6 210');
    expect(text).not.toContain('4.1 ×');
  });

  it('says beside the number that it is not corrected for the response', () => {
    const temperature = { ...fixture.diagnosis.temperature, responseCorrected: false };
    const text = readerText(reportOf({ temperature }));
    expect(text).toContain('Not corrected for the spectral response');
    expect(text).toContain('not corrected for the response');
    expect(readerText(reportOf())).not.toContain('Not corrected');
  });
});

describe('odd input', () => {
  const hostile = "\"><script>alert(1)</script><b onclick='x'>&amp;";

  it('shows hostile text as text, wherever it comes from', () => {
    const { diagnosis } = fixture;
    const html = reportOf(
      {
        recording: { ...diagnosis.recording, name: hostile, sha256: hostile },
        inputs: {
          bench: hostile,
          dark: { name: hostile, sha256: hostile },
          response: { name: hostile, sha256: hostile, per: 'photon' },
          profile: { name: hostile, sha256: hostile },
          mirror: { name: hostile, sha256: hostile },
          source: { name: hostile, sha256: hostile },
          through: { name: hostile, sha256: hostile },
        },
        options: { ...diagnosis.options, leftOut: [hostile] },
        axis: { ...diagnosis.axis, text: hostile },
        lines: diagnosis.lines.map((line) => ({ ...line, id: hostile, used: false, reasons: [hostile] })),
        temperature: { ...diagnosis.temperature, text: hostile },
        electronDensity: { ...diagnosis.electronDensity, text: hostile, line: hostile },
        meaning: { ...diagnosis.meaning, text: hostile },
        impurities: [
          {
            species: hostile,
            emitter: hostile,
            evidence: hostile,
            signalToNoise: 3,
            meaning: hostile,
            linesSeen: 2,
            linesExpected: 2,
            chanceProbability: 0.001,
            confidence: 'likely',
          },
        ],
        benchFindings: [
          {
            id: 'air-leak',
            title: hostile,
            confidence: 'likely',
            evidenceFor: [hostile],
            evidenceAgainst: [hostile],
            wouldSettle: [hostile],
          },
        ],
        unassignedPeaks: {
          count: 1,
          nearBalmerCount: 0,
          strongest: [{ wavelengthNm: 500, signalToNoise: 5, candidates: [hostile] }],
        },
        checks: [{ id: hostile, verdict: 'sound', facts: {}, text: hostile, remedy: hostile }],
        budget: [{ source: hostile, sigmaKelvin: 1, share: 1, remedy: hostile, ...unstated }],
        verdictText: hostile,
        notes: [hostile],
      },
      {
        bench: { name: hostile, lamp: { id: hostile, gas: hostile } },
        cautions: [{ id: hostile, hazard: 'hydrogen', text: hostile, appliesBecause: hostile }],
        generatedAt: hostile,
      },
    );
    const root = readMarkup(html);
    const names = [...elementsOf(root)].map(({ name }) => name);
    expect(names).not.toContain('script');
    expect(names).not.toContain('b');
    expect(visibleText(root).split(hostile).length).toBeGreaterThan(25);
  });

  it('takes a name of 255 characters and a report without time, bench or cautions', () => {
    const name = `${'n'.repeat(251)}.csv`;
    const html = buildHtmlReport({
      diagnosis: { ...fixture.diagnosis, recording: { ...fixture.diagnosis.recording, name } },
      figures: fixture.figures,
      cautions: [],
      generatedAt: null,
    });
    const text = readerText(html);
    expect(text).toContain(name);
    expect(text).toContain('time not stated');
    expect(text).toContain(notASafetyDevice);
  });

  it.each([0, 1, 12])('takes %d lines', (count) => {
    const pick = <T>(items: readonly T[]) =>
      Array.from({ length: count }, (_, k) => items[k % items.length] as T);
    const { figures } = fixture;
    const html = reportOf(
      { lines: pick(fixture.diagnosis.lines) },
      {
        figures: {
          recording: { ...figures.recording, marks: pick(figures.recording.marks) },
          lines: pick(figures.lines),
          populations: { ...figures.populations, points: pick(figures.populations.points) },
        },
      },
    );
    const titles = [...elementsOf(readMarkup(html))].filter(
      (each) => each.name === 'title' && visibleText(each).endsWith('data, fit and residuals'),
    );
    expect(titles).toHaveLength(count);
    expect(readerText(html).includes('No line was looked for')).toBe(count === 0);
  });
});
