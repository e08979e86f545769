import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { formatInterval, formatPercent, formatSignificant, formatWithSigma } from '../text/format-number.ts';
import { formatDensityNumber } from './format-answer.ts';
import { paragraph, section, table, text } from './html.ts';
import { lineLabel } from './line-label.ts';

export type OpticalDepth = Diagnosis['opticalDepths'][number];

/** What was measured with a mirror or a light source behind the tube; nothing where neither was. */
export function opticalDepthSection({ opticalDepths }: Diagnosis): string {
  if (opticalDepths.length === 0) return '';
  const number = { className: 'number' };
  return section(
    'optical-depth',
    'Optical depth',
    table(
      opticalDepths,
      [
        { heading: 'line', cell: ({ lineId }) => text(lineLabel(lineId)) },
        { heading: 'with', cell: ({ method }) => text(methodWord[method]) },
        { heading: 'seen', ...number, cell: (each) => text(seenAtLine(each)) },
        { heading: 'thin lines', ...number, cell: (each) => text(seenAtThinLines(each)) },
        { heading: 'optical depth', ...number, cell: (each) => text(depthRange(each)) },
        { heading: 'atoms in n = 2 / m⁻²', ...number, cell: (each) => text(columnRange(each)) },
        { heading: 'light that leaves', ...number, cell: (each) => text(lightThatLeaves(each)) },
      ],
      { caption: opticalDepthCaption(opticalDepths[0]!.coverage) },
    ),
    ...whyNot(opticalDepths).map((sentence) => paragraph(sentence, 'small')),
  );
}

export const methodWord: Readonly<Record<OpticalDepth['method'], string>> = {
  mirror: 'mirror',
  absorption: 'source',
};

export const opticalDepthCaption = (coverage: number): string =>
  `Mirror: light with it over light without. Source: width of continuum that is missing. Depths at the peak of the atoms' own profile, once through the tube, with ${formatPercent(coverage)} ranges; ± is 1 σ.`;

/** "1.294 ± 0.012" or "12.1 ± 0.5 pm"; what was measured at the line. */
export function seenAtLine({
  ratio,
  ratioSigma,
  equivalentWidthNm,
  equivalentWidthSigmaNm,
}: OpticalDepth): string {
  if (ratio !== null && ratioSigma !== null) return formatWithSigma(ratio, ratioSigma);
  if (equivalentWidthNm === null || equivalentWidthSigmaNm === null) return '–';
  return `${formatWithSigma(1000 * equivalentWidthNm, 1000 * equivalentWidthSigmaNm)} pm`;
}

export const seenAtThinLines = ({ thinRatio, thinRatioSigma }: OpticalDepth): string =>
  thinRatio === null || thinRatioSigma === null ? '–' : formatWithSigma(thinRatio, thinRatioSigma);

/** "0.85 to 1.2", "< 0.3", "> 4" or "not determined". */
export function depthRange({ status, low, high }: OpticalDepth): string {
  if (status === 'not-determined') return 'not determined';
  if (status === 'upper-limit' || low === null)
    return high === null ? 'not determined' : `< ${formatSignificant(high, 2)}`;
  return high === null ? `> ${formatSignificant(low, 2)}` : formatInterval(low, high);
}

export function columnRange({
  status,
  columnDensityLowPerSquareMetre: low,
  columnDensityHighPerSquareMetre: high,
}: OpticalDepth): string {
  if (status === 'not-determined') return '–';
  if (status === 'upper-limit' || low === null) return high === null ? '–' : `< ${formatDensityNumber(high)}`;
  return high === null
    ? `> ${formatDensityNumber(low)}`
    : `${formatDensityNumber(low)} to ${formatDensityNumber(high)}`;
}

export const lightThatLeaves = ({ areaFactor }: OpticalDepth): string =>
  areaFactor === null ? '–' : formatPercent(areaFactor, 1);

/** The sentences of lines that could not be measured. */
export const whyNot = (opticalDepths: readonly OpticalDepth[]): readonly string[] =>
  opticalDepths.filter(({ status }) => status === 'not-determined').map(({ text: sentence }) => sentence);
