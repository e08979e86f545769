import type { Check, DiagnosedLine, Diagnosis } from '../diagnosis/diagnosis.ts';
import type { Figures, PopulationPoint } from '../diagnosis/figures.ts';
import { budgetColumns, budgetSummary } from './budget-table.ts';
import { crossChecksSection } from './cross-checks-section.ts';
import { budgetSvg } from './figures-budget.ts';
import { lineSvg } from './figures-line.ts';
import { populationsSvg } from './figures-populations.ts';
import { recordingSvg } from './figures-recording.ts';
import { isTemperatureWithheld } from './format-answer.ts';
import {
  formatAtPlace,
  formatExact,
  formatPercent,
  formatSignificant,
  formatWithSigma,
} from '../text/format-number.ts';
import { typeset } from '../text/typeset.ts';
import { type Column, paragraph, section, table, text } from './html.ts';
import { impuritiesSection } from './impurities-section.ts';
import { lineLabel } from './line-label.ts';
import { opticalDepthSection } from './optical-depth-section.ts';
import { element, idFrom } from './svg.ts';
import { verdictRank, verdictShapeSvg } from './verdict-shape.ts';

/** The argument of the report, from what was recorded to what limits the result. */
export function evidenceSections(diagnosis: Diagnosis, figures: Figures): string {
  return [
    recordingSection(diagnosis, figures),
    linesSection(diagnosis, figures),
    populationsSection(diagnosis, figures),
    crossChecksSection(diagnosis),
    opticalDepthSection(diagnosis),
    checksSection(diagnosis.checks),
    budgetSection(diagnosis),
    impuritiesSection(diagnosis),
  ].join('');
}

function recordingSection({ axis }: Diagnosis, figures: Figures): string {
  const clippedCount = figures.recording.clipped.reduce((sum, flag) => sum + flag, 0);
  const clipped = clippedCount === 0 ? '' : ` Crosses: clipped pixels (${formatAtPlace(clippedCount, 0)}).`;
  return section(
    'recording',
    'The recording',
    figure(
      recordingSvg(figures.recording, { id: 'figure-recording' }),
      `Recorded signal less dark. Shaded: fitted windows. Names in brackets: lines found but not used.${clipped}`,
    ),
    paragraph(axis.text),
  );
}

function linesSection({ lines }: Diagnosis, figures: Figures): string {
  const drawn = figures.lines.map((each, index) => {
    const line = lines.find(({ id }) => id === each.lineId);
    const options = {
      id: idFrom('figure-line', index, each.lineId),
      signalUnit: figures.recording.signalUnit,
    };
    const caption =
      line === undefined || line.reducedChiSquare === null
        ? ''
        : `χ²/ν = ${formatSignificant(line.reducedChiSquare, 3)}`;
    return figure(lineSvg(each, line, options), caption);
  });
  const key =
    'Points: pixels with 1 σ bars. Solid: fit. Dashed: baseline. Crosses: clipped pixels. Strip: (signal − fit) / σ, dashed at 0 and ±2.';
  return section(
    'lines',
    'The lines',
    drawn.length === 0 ? '' : element('div', { class: 'line-figures' }, ...drawn),
    drawn.length === 0 ? '' : paragraph(key, 'small because'),
    lines.length === 0
      ? paragraph('No line was looked for.')
      : table(lines, lineColumns(lines), {
          caption: `Areas in ${areaUnits(lines)}, before the response is divided out; widths are full widths at half maximum; ± is 1 σ.`,
          rowClass: (line) => (line.used ? '' : 'left-out'),
        }),
  );
}

function areaUnits(lines: readonly DiagnosedLine[]): string {
  return [...new Set(lines.map((line) => line.areaUnit))].join(' or ');
}

function lineColumns(lines: readonly DiagnosedLine[]): Column<DiagnosedLine>[] {
  const number = { className: 'number' };
  const columns: Column<DiagnosedLine>[] = [
    { heading: 'line', cell: (line) => text(lineLabel(line.id)) },
    { heading: 'reference / nm', ...number, cell: (line) => formatAtPlace(line.referenceNm, -3) },
    {
      heading: 'found / nm',
      ...number,
      cell: (line) => text(formatWithSigma(line.centreNm, line.centreSigmaNm)),
    },
    { heading: 'area', ...number, cell: (line) => text(formatWithSigma(line.area, line.areaSigma)) },
    { heading: 'S/N', ...number, cell: (line) => formatSignificant(line.signalToNoise, 2) },
    { heading: 'Gauss / nm', ...number, cell: (line) => formatSignificant(line.gaussianFwhmNm, 3) },
    {
      heading: 'Lorentz / nm',
      ...number,
      cell: (line) => text(formatWithSigma(line.lorentzianFwhmNm, line.lorentzianFwhmSigmaNm)),
    },
    {
      heading: 'used',
      className: 'reason',
      cell: (line) => text(line.used ? 'yes' : `no: ${line.reasons.join('; ') || 'no reason given'}`),
    },
  ];
  return lines.some((line) => line.area !== null)
    ? columns
    : columns.filter(({ heading }) => !isFitColumn(heading));
}

/** Columns that stay empty when nothing could be fitted. */
function isFitColumn(heading: string): boolean {
  return !['line', 'reference / nm', 'used'].includes(heading);
}

function populationsSection(diagnosis: Diagnosis, figures: Figures): string {
  const { points, line } = figures.populations;
  if (points.length === 0) return '';
  const { chiSquare, degreesOfFreedom, coverage } = diagnosis.temperature;
  const quality =
    chiSquare === null || degreesOfFreedom === null
      ? ''
      : ` χ² = ${formatSignificant(chiSquare, 2)} at ${formatAtPlace(degreesOfFreedom, 0)} degrees of freedom.`;
  const band =
    line === null ? 'No line could be fitted.' : `Line with its ${formatPercent(coverage, 1)} band.`;
  const columns: Column<PopulationPoint>[] = [
    { heading: 'line', cell: (point) => text(lineLabel(point.lineId)) },
    { heading: 'E / eV', className: 'number', cell: (point) => formatAtPlace(point.upperEnergyEv, -3) },
    { heading: 'ln(n / g)', className: 'number', cell: populationText },
    { heading: 'used', cell: (point) => (point.used ? 'yes' : 'no') },
  ];
  return section(
    'populations',
    'The populations',
    element(
      'div',
      { class: 'population-pair' },
      figure(
        populationsSvg(figures.populations, { id: 'figure-populations' }),
        `${band} Hollow: left out. Arrow: upper limit.${quality}`,
      ),
      table(points, columns, {
        caption: 'ln(n / g) is relative: only differences count.',
        rowClass: (point) => (point.used ? '' : 'left-out'),
      }),
    ),
  );
}

function populationText(point: PopulationPoint): string {
  if (point.lnPopulation === null) return '–';
  if (point.isUpperLimit) return text(`< ${formatAtPlace(point.lnPopulation, -2)}`);
  return text(formatWithSigma(point.lnPopulation, point.lnPopulationSigma));
}

function checksSection(checks: readonly Check[]): string {
  const worstFirst = checks
    .map((check, index) => ({ check, index }))
    .sort((a, b) => verdictRank[a.check.verdict] - verdictRank[b.check.verdict] || a.index - b.index);
  const items = worstFirst.map(
    ({ check }) =>
      `<li>${verdictShapeSvg(check.verdict, 11)}<span class="word">${text(check.verdict)}</span><div>${text(check.text)}${
        check.remedy === '' ? '' : ` <strong>To do:</strong> ${text(check.remedy)}`
      }</div></li>`,
  );
  return section(
    'checks',
    'Can it be trusted?',
    items.length === 0 ? '' : `<ul class="check-list">${items.join('')}</ul>`,
  );
}

function budgetSection(diagnosis: Diagnosis): string {
  const { temperature } = diagnosis;
  const budget = [...diagnosis.budget].sort((a, b) => b.share - a.share);
  if (budget.length === 0) return '';
  const hasKelvin = temperature.status === 'measured' && !isTemperatureWithheld(diagnosis);
  // The remedies say which uncertainty would be reached, in kelvins: no text for a temperature that is not stated.
  const remedies = (hasKelvin ? budget : [])
    .filter(({ remedy }) => remedy !== '')
    .map(({ source, remedy }) => `<li><strong>${text(source)}.</strong> ${text(remedy)}</li>`);
  return section(
    'budget',
    'What limits it?',
    figure(
      budgetSvg(budget, { id: 'figure-budget', hasKelvin }),
      `Share of the variance of the temperature${hasKelvin ? ', and the standard uncertainty each source gives alone' : ''}.`,
    ),
    hasKelvin ? budgetTable(diagnosis) : '',
    remedies.length === 0 ? '' : `<ul class="plain">${remedies.join('')}</ul>`,
    diagnosis.monteCarlo === null || !hasKelvin
      ? ''
      : paragraph(`${typeset(diagnosis.monteCarlo.text)} Seed ${formatExact(diagnosis.monteCarlo.seed)}.`),
  );
}

function budgetTable({ budget, temperature }: Diagnosis): string {
  return table(
    [...budget].sort((a, b) => b.share - a.share),
    budgetColumns.map(({ heading, cell }, index) => ({
      heading,
      cell: (entry) => text(cell(entry)),
      ...(index === 0 ? {} : { className: 'number' }),
    })),
    { caption: budgetSummary(temperature) },
  );
}

function figure(svg: string, caption: string): string {
  return element('figure', {}, svg, caption === '' ? '' : element('figcaption', {}, text(caption)));
}
