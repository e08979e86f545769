import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { ink } from './chart-style.ts';
import { formatPercent, formatSignificant } from '../text/format-number.ts';
import { element, escapeMarkup, figureRoot, textElement } from './svg.ts';

type BudgetEntry = Diagnosis['budget'][number];

const width = 680;
const rowHeight = 20;
const bar = { left: 210, width: 330, height: 11 };
const longestLabel = 34;

/**
 * The uncertainty budget as bars, one a source, in the order given; the length is the share of the variance.
 *
 * @param options.hasKelvin  false where no temperature is stated: shares only, since kelvins would be a value
 */
export function budgetSvg(
  budget: readonly BudgetEntry[],
  options: { readonly id: string; readonly hasKelvin: boolean },
): string {
  const rows = budget.map((entry, index) => row(entry, index * rowHeight + 4, options.hasKelvin));
  const spoken = budget.map(({ source, share }) => `${source} ${formatPercent(share)}`).join('; ');
  return figureRoot(
    {
      id: options.id,
      width,
      height: Math.max(1, budget.length) * rowHeight + 8,
      title: 'What the uncertainty is made of',
      description: `Share of the variance: ${spoken || 'nothing listed'}.`,
    },
    rows,
  );
}

function row(entry: BudgetEntry, top: number, hasKelvin: boolean): string {
  const share = Math.max(0, Math.min(1, entry.share));
  const label =
    entry.source.length > longestLabel ? `${entry.source.slice(0, longestLabel - 1)}…` : entry.source;
  const baseline = top + 11;
  const kelvin = hasKelvin ? `${formatSignificant(entry.sigmaKelvin, 2)} K` : '';
  return element(
    'g',
    {},
    element('title', {}, escapeMarkup(entry.source)),
    textElement(label, { x: bar.left - 8, y: baseline, 'text-anchor': 'end', fill: ink.text }),
    element('rect', { x: bar.left, y: top + 2, width: bar.width, height: bar.height, fill: ink.strip }),
    element('rect', {
      x: bar.left,
      y: top + 2,
      width: Math.max(0.8, share * bar.width),
      height: bar.height,
      fill: ink.bar,
    }),
    textElement(formatPercent(share), {
      x: bar.left + bar.width + 44,
      y: baseline,
      'text-anchor': 'end',
      fill: ink.text,
      'font-weight': 600,
    }),
    kelvin === ''
      ? ''
      : textElement(kelvin, { x: width - 24, y: baseline, 'text-anchor': 'end', fill: ink.muted }),
  );
}
