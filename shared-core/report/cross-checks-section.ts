import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { formatInterval, formatPercent, formatSignificant, formatWithSigma } from '../text/format-number.ts';
import { typeset } from '../text/typeset.ts';
import { formatDensityNumber } from './format-answer.ts';
import { paragraph, section, table, text } from './html.ts';
import { lineLabel } from './line-label.ts';

type LineRatio = Diagnosis['lineRatios'][number];

/** What stands behind the answer: other ways to the same numbers, and what the plasma has to be for them to mean it. */
export function crossChecksSection(diagnosis: Diagnosis): string {
  const { lineRatios, equilibrium, selfAbsorption, deuterium, gasTemperature, companions } = diagnosis;
  const number = { className: 'number' };
  return section(
    'cross-checks',
    'What stands behind it',
    lineRatios.length === 0
      ? paragraph('There are not two lines in use to compare.')
      : table(
          lineRatios,
          [
            {
              heading: 'lines',
              cell: ({ numerator, denominator }) =>
                text(`${lineLabel(numerator)} ∕ ${lineLabel(denominator)}`),
            },
            {
              heading: 'ratio',
              ...number,
              cell: ({ ratio, ratioSigma }) => (ratio === null ? '–' : formatWithSigma(ratio, ratioSigma)),
            },
            { heading: 'at infinite T', ...number, cell: ({ limit }) => formatSignificant(limit, 4) },
            { heading: 'temperature / K', ...number, cell: (ratio) => text(ratioTemperature(ratio)) },
          ],
          {
            caption: `Temperatures of two lines at a time, ${formatPercent(lineRatios[0]!.coverage)} ranges.`,
          },
        ),
    table(
      [
        ...equilibrium.levels.map(({ upperLevel, lineIds, neededPerCubicMetre, status }) => ({
          name: `n = ${String(upperLevel)} (${lineIds.map(lineLabel).join(', ')})`,
          neededPerCubicMetre,
          status,
        })),
        { name: 'all, ground state too', ...equilibrium.complete },
      ],
      [
        { heading: 'level', cell: ({ name }) => text(name) },
        {
          heading: 'density it takes / m⁻³',
          ...number,
          cell: ({ neededPerCubicMetre }) =>
            neededPerCubicMetre === null ? '–' : text(formatDensityNumber(neededPerCubicMetre)),
        },
        { heading: 'reached', cell: ({ status }) => text(equilibriumWord[status]) },
      ],
      { caption: 'Equilibrium of the levels with the free electrons.' },
    ),
    ...[
      equilibrium.text,
      equilibrium.saha.text,
      equilibrium.seriesLimit.text,
      selfAbsorption.text,
      deuterium.text,
      gasTemperature.text,
      diagnosis.instrumentProfile?.text ?? '',
      ...companions.map((companion) => companion.text),
    ]
      .filter((sentence) => sentence !== '')
      .map((sentence) => paragraph(typeset(sentence))),
  );
}

/** "6 020 to 6 430", "> 4 500", or why there is none. */
export function ratioTemperature({ status, kelvin, lowKelvin, highKelvin }: LineRatio): string {
  if (status === 'measured' && kelvin !== null && lowKelvin !== null && highKelvin !== null)
    return formatInterval(lowKelvin, highKelvin);
  if (status === 'lower-limit' && lowKelvin !== null) return `> ${formatSignificant(lowKelvin, 2)}`;
  return status === 'no-positive-temperature' ? 'none positive' : 'not determined';
}

/** Whether a level holds equilibrium, in a word. */
export const equilibriumWord = {
  equilibrated: 'yes',
  'not-equilibrated': 'no',
  'not-known': 'not known',
} as const;
