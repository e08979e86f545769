import { describe, expect, it } from 'vitest';
import type { Figures, LineFigure } from '../../../shared-core/diagnosis/figures.ts';
import { budgetSvg } from '../../../shared-core/report/figures-budget.ts';
import { lineSvg } from '../../../shared-core/report/figures-line.ts';
import { populationsSvg } from '../../../shared-core/report/figures-populations.ts';
import { recordingSvg, spreadLabels } from '../../../shared-core/report/figures-recording.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import { elementsOf, readMarkup, visibleText } from '../../support/check-markup.ts';
import { sheetFixture } from '../../support/sheet-fixture.ts';
import { unstated } from '../../support/sheet-fixture.ts';

const { diagnosis, figures } = sheetFixture();
const hostile = '<script>alert("1")</script>\'&\u0000';

function firstLine(): LineFigure {
  const line = figures.lines[1];
  if (line === undefined) throw new Error('the fixture has a second line');
  return line;
}

/** Every figure of a report, from one set of figures. */
function allSvgs(from: Figures): string[] {
  return [
    recordingSvg(from.recording, { id: 'r' }),
    ...from.lines.map((line, index) =>
      lineSvg(line, diagnosis.lines[index], { id: `l${String(index)}`, signalUnit: 'counts' }),
    ),
    populationsSvg(from.populations, { id: 'p' }),
    budgetSvg(diagnosis.budget, { id: 'b', hasKelvin: true }),
  ];
}

describe('every figure', () => {
  it('is well formed, has a title and a description, and runs or loads nothing', () => {
    for (const svg of allSvgs(figures)) {
      const all = [...elementsOf(readMarkup(svg))];
      expect(all[1]?.name).toBe('svg');
      expect(all[1]?.attributes.get('role')).toBe('img');
      expect(all.filter(({ name }) => name === 'title').length).toBeGreaterThanOrEqual(1);
      expect(all.filter(({ name }) => name === 'desc')).toHaveLength(1);
      for (const { name, attributes } of all) {
        expect(['script', 'style', 'image', 'use', 'foreignObject', 'a']).not.toContain(name);
        for (const [key, value] of attributes) {
          expect(key).not.toMatch(/^on|href|^style$/);
          if (key !== 'xmlns') expect(value).not.toMatch(/https?:|url\(/);
        }
      }
    }
  });

  it('draws inside its frame: no coordinate is missing or not a number', () => {
    for (const svg of allSvgs(figures)) expect(svg).not.toMatch(/NaN|Infinity|undefined|null/);
  });

  it('shows hostile names as text and nothing else', () => {
    const named: Figures = {
      recording: {
        ...figures.recording,
        marks: figures.recording.marks.map((mark) => ({ ...mark, lineId: hostile })),
      },
      lines: figures.lines.map((line) => ({ ...line, lineId: hostile })),
      populations: {
        ...figures.populations,
        points: figures.populations.points.map((point) => ({ ...point, lineId: hostile })),
      },
    };
    for (const svg of allSvgs(named)) {
      expect([...elementsOf(readMarkup(svg))].map(({ name }) => name)).not.toContain('script');
    }
    const budget = budgetSvg([{ source: hostile, sigmaKelvin: 1, share: 1, remedy: '', ...unstated }], {
      id: 'b',
      hasKelvin: true,
    });
    expect(visibleText(readMarkup(budget))).toContain('<script>alert("1")</script>\'&\uFFFD');
  });

  it('is the same text for the same input', () => {
    expect(allSvgs(sheetFixture().figures)).toEqual(allSvgs(figures));
  });
});

describe('recordingSvg', () => {
  it('names the lines, in brackets where they are not used, and keeps the tallest pixel', () => {
    const svg = recordingSvg(figures.recording, { id: 'r' });
    const text = visibleText(readMarkup(svg));
    expect(text).toContain('(Hα)');
    expect(text).toMatch(/ Hβ /);
    expect(text).toContain('ordinate enlarged');
  });

  it('leaves the enlarged panel out where no line is weak', () => {
    const strong = {
      ...figures.recording,
      marks: figures.recording.marks.filter(({ lineId }) => lineId === 'H-beta'),
    };
    expect(recordingSvg(strong, { id: 'r' })).not.toContain('ordinate enlarged');
  });

  it('draws a flat recording and one without marks', () => {
    const flat = {
      ...figures.recording,
      signal: figures.recording.signal.map(() => 0),
      clipped: figures.recording.clipped.map(() => 0),
      windows: [],
      marks: [],
    };
    const text = visibleText(readMarkup(recordingSvg(flat, { id: 'r' })));
    expect(text).toContain('Lines marked: none');
  });
});

describe('spreadLabels', () => {
  it('leaves labels that do not touch at their anchors', () => {
    const labels = [
      { at: 20, width: 10 },
      { at: 60, width: 10 },
    ];
    expect(spreadLabels(labels, { from: 0, to: 100 })).toEqual([20, 60]);
  });

  it('keeps labels at one anchor side by side around it', () => {
    const labels = [
      { at: 50, width: 10 },
      { at: 50, width: 10 },
      { at: 50, width: 10 },
    ];
    expect(spreadLabels(labels, { from: 0, to: 100 })).toEqual([40, 50, 60]);
  });

  it('never overlaps and keeps the order, however the anchors lie', () => {
    const labels = Array.from({ length: 12 }, (_, k) => ({ at: 30 + ((k * k) % 7) * 0.5 + k, width: 12 }));
    const centres = spreadLabels(labels, { from: 0, to: 400 });
    for (const [index, centre] of centres.slice(1).entries())
      expect(centre - (centres[index] ?? 0)).toBeGreaterThanOrEqual(12 - 1e-9);
    expect(centres[0]).toBeGreaterThanOrEqual(6);
  });
});

describe('lineSvg', () => {
  it('has one point a pixel in the fit and in the residuals', () => {
    const line = firstLine();
    const svg = lineSvg(line, diagnosis.lines[1], { id: 'l', signalUnit: 'counts' });
    const circles = [...elementsOf(readMarkup(svg))].filter(({ name }) => name === 'circle');
    expect(circles).toHaveLength(2 * line.wavelengthNm.length);
  });

  it('says that a line is left out, and marks clipped pixels as crosses, not as points', () => {
    const clipped = figures.lines[0];
    if (clipped === undefined) throw new Error('the fixture has a first line');
    const svg = lineSvg(clipped, diagnosis.lines[0], { id: 'l', signalUnit: 'counts' });
    const flagged = clipped.clipped.reduce((sum, flag) => sum + flag, 0);
    expect(flagged).toBeGreaterThan(0);
    const circles = [...elementsOf(readMarkup(svg))].filter(({ name }) => name === 'circle');
    expect(circles).toHaveLength(2 * (clipped.wavelengthNm.length - flagged));
    expect(visibleText(readMarkup(svg))).toContain('left out');
  });

  it('cuts a very long name', () => {
    const svg = lineSvg({ ...firstLine(), lineId: 'x'.repeat(400) }, undefined, {
      id: 'l',
      signalUnit: 'signal',
    });
    const texts = [...elementsOf(readMarkup(svg))].filter(({ name }) => name === 'text').map(visibleText);
    expect(Math.max(...texts.map((text) => text.length))).toBeLessThanOrEqual(22);
  });

  it.each([1e-9, 1e9])('takes the power of ten out to the label for signals of size %d', (size) => {
    const line = firstLine();
    const scaled = (array: Float64Array) => array.map((each) => each * size);
    const figure = {
      ...line,
      signal: scaled(line.signal),
      sigma: scaled(line.sigma),
      model: scaled(line.model),
      baseline: scaled(line.baseline),
      curve: scaled(line.curve),
    };
    const text = visibleText(readMarkup(lineSvg(figure, undefined, { id: 'l', signalUnit: 'signal' })));
    expect(text).toMatch(/signal \/\u202f10[⁻⁰¹²³⁴-⁹]+/);
  });
});

describe('populationsSvg', () => {
  it('fills used points, leaves others hollow, and draws limits as arrows', () => {
    const [first, second, third] = figures.populations.points;
    if (!first || !second || !third) throw new Error('the fixture has three points');
    const svg = populationsSvg(
      { ...figures.populations, points: [{ ...first, used: true }, { ...second, used: false }, { ...third, isUpperLimit: true }] }, // prettier-ignore
      { id: 'p' },
    );
    const circles = [...elementsOf(readMarkup(svg))].filter(({ name }) => name === 'circle');
    expect(circles.map(({ attributes }) => attributes.get('fill'))).toEqual(['#1C2024', '#FFFFFF']);
    expect(svg).toContain('v15m-3 -5l3 5l3 -5');
    expect(visibleText(readMarkup(svg))).toContain('upper limit');
  });

  it('dashes a line that the data do not support, and says so', () => {
    const svg = populationsSvg({ ...figures.populations, verdict: 'not defensible' }, { id: 'p' });
    expect(svg).toContain('stroke-dasharray="6 3"');
    expect(visibleText(readMarkup(svg))).toContain('not supported');
    expect(populationsSvg(figures.populations, { id: 'p' })).not.toContain('stroke-dasharray="6 3"');
  });

  it('draws without a line, with one point, and with none', () => {
    for (const points of [figures.populations.points.slice(0, 1), []]) {
      const svg = populationsSvg({ points, line: null, verdict: 'not defensible' }, { id: 'p' });
      expect(visibleText(readMarkup(svg))).toContain('No line could be fitted');
    }
  });
});

describe('budgetSvg', () => {
  it('makes the bars as long as the shares and withholds kelvins where no temperature stands', () => {
    const entries = [
      { source: 'response', sigmaKelvin: 80, share: 0.75, remedy: '', ...unstated },
      { source: 'noise', sigmaKelvin: 46, share: 0.25, remedy: '', ...unstated },
    ];
    const svg = budgetSvg(entries, { id: 'b', hasKelvin: false });
    const widths = [...elementsOf(readMarkup(svg))]
      .filter(({ name, attributes }) => name === 'rect' && attributes.get('fill') === '#0072B2')
      .map(({ attributes }) => Number(attributes.get('width')));
    expect((widths[0] ?? 0) / (widths[1] ?? 1)).toBeCloseTo(3, 6);
    expect(svg).not.toContain(' K<');
    expect(budgetSvg(entries, { id: 'b', hasKelvin: true })).toContain('80 K<');
  });
});

describe('lineLabel', () => {
  it.each([
    ['H-alpha', 'Hα'],
    ['D-epsilon', 'Dε'],
    ['H-8', 'H8'],
    ['H-12', 'H12'],
    ['Hg 435.8', 'Hg 435.8'],
    ['H-omega', 'H-omega'],
  ])('shows %s as %s', (id, label) => {
    expect(lineLabel(id)).toBe(label);
  });
});
