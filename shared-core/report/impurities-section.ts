import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { formatAtPlace, formatSignificant, type NumberStyle } from '../text/format-number.ts';
import { type Column, paragraph, section, table, text } from './html.ts';
import { element } from './svg.ts';

type Impurity = Diagnosis['impurities'][number];
type Finding = Diagnosis['benchFindings'][number];

/** Said where there is nothing to show. */
export const nothingFound = ({ axis }: Diagnosis): string =>
  axis.status === 'registered'
    ? 'No other species was found above chance.'
    : 'Not looked for: the wavelength axis could not be settled.';

/** "below 0.0001 %": that noise and stray lines look like this. */
export function chanceText({ chanceProbability }: Impurity, style?: NumberStyle): string {
  const percent = 100 * chanceProbability;
  return percent < 1e-4 ? 'below 0.0001 %' : `${formatSignificant(percent, 1, style)} %`;
}

/** What a finding rests on, as short paragraphs with a heading each; empty parts are left out. */
export function findingParts(
  finding: Finding,
): readonly (readonly [heading: string, lines: readonly string[]])[] {
  const parts = [
    ['For', finding.evidenceFor],
    ['Against', finding.evidenceAgainst],
    ['Would settle it', finding.wouldSettle],
  ] as const;
  return parts.filter(([, lines]) => lines.length > 0);
}

/** "3 peaks have no name: 589.19 nm (S/N 12; at the place of Na I 589.19 nm), ..."; empty where there are none. */
export function unassignedText({ unassignedPeaks }: Diagnosis, style?: NumberStyle): string {
  const { count, strongest } = unassignedPeaks;
  if (count === 0) return '';
  const places = strongest.map(({ wavelengthNm, signalToNoise, candidates }) => {
    const near = candidates.length === 0 ? '' : `; at the place of ${candidates.join(', ')}`;
    return `${formatAtPlace(wavelengthNm, -2, style)} nm (S/N ${formatSignificant(signalToNoise, 2, style)}${near})`;
  });
  const more = count > strongest.length ? ` and ${String(count - strongest.length)} fainter` : '';
  return `${count === 1 ? 'One peak has' : `${String(count)} peaks have`} no name: ${places.join(', ')}${more}. One coincidence names no species.`;
}

export const impurityColumns: readonly {
  readonly heading: string;
  readonly cell: (each: Impurity) => string;
}[] = [
  { heading: 'evidence', cell: ({ evidence }) => evidence },
  { heading: 'S/N', cell: ({ signalToNoise }) => formatSignificant(signalToNoise, 2) },
  { heading: 'how sure', cell: ({ confidence }) => confidence },
  { heading: 'by chance', cell: (each) => chanceText(each) },
  { heading: 'what it means', cell: ({ meaning }) => meaning },
];

export function impuritiesSection(diagnosis: Diagnosis): string {
  const { impurities, benchFindings } = diagnosis;
  const columns: Column<Impurity>[] = [
    { heading: 'species', cell: ({ emitter }) => text(emitter) },
    ...impurityColumns.map(({ heading, cell }) => ({
      heading,
      cell: (each: Impurity) => text(cell(each)),
      ...(heading === 'S/N' ? { className: 'number' } : {}),
      ...(heading === 'what it means' ? { className: 'reason' } : {}),
    })),
  ];
  const unassigned = unassignedText(diagnosis);
  return section(
    'impurities',
    'What else is in the tube?',
    impurities.length === 0
      ? paragraph(nothingFound(diagnosis))
      : table(impurities, columns, { caption: 'Found besides hydrogen atoms' }),
    benchFindings.length === 0
      ? ''
      : element(
          'ul',
          { class: 'plain' },
          ...benchFindings.map((finding) => element('li', {}, findingHtml(finding))),
        ),
    unassigned === '' ? '' : paragraph(unassigned),
  );
}

/** Parts of a finding as running text: "For: ...; .... Against: ...". */
export const findingText = (finding: Finding): string =>
  findingParts(finding)
    .map(([heading, lines]) => `${heading}: ${lines.join('; ').replaceAll('.; ', '. ').replace(/\.$/, '')}.`)
    .join(' ');

const findingHtml = (finding: Finding): string =>
  `<strong>${text(finding.title)}</strong> (${text(finding.confidence)}). ${text(findingText(finding))}`;
