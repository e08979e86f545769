import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { formatAtPlace, formatPercent, formatSignificant } from '../text/format-number.ts';
import { coverageFactor } from '../uncertainty/gum.ts';

type BudgetEntry = Diagnosis['budget'][number];

/** The columns of the uncertainty budget, as every door shows them; cells are plain text. */
export const budgetColumns: readonly {
  readonly heading: string;
  readonly cell: (entry: BudgetEntry) => string;
}[] = [
  { heading: 'component', cell: ({ source }) => source },
  { heading: 'standard uncertainty', cell: causeText },
  { heading: 'of the areas', cell: areasText },
  { heading: 'sensitivity', cell: sensitivityText },
  { heading: 'contribution, K', cell: ({ sigmaKelvin }) => formatSignificant(sigmaKelvin, 2) },
  { heading: 'share', cell: ({ share }) => shareText(share) },
  {
    heading: 'degrees of freedom',
    cell: ({ degreesOfFreedom }) => (degreesOfFreedom === null ? '∞' : formatAtPlace(degreesOfFreedom, 0)),
  },
];

function shareText(share: number): string {
  if (share < 5e-5) return `< ${formatPercent(1e-4, 2)}`;
  return formatPercent(share, share < 0.01 ? 2 : 0);
}

/** "10 K"; "by line" where every line has its own. */
function causeText({ standardUncertainty, unit }: BudgetEntry): string {
  if (standardUncertainty === null) return 'by line';
  return formatSignificant(standardUncertainty, 2) + (unit === '1' ? '' : ` ${unit}`);
}

/** "0.12 to 3.4 %": what the component does to the areas of the lines used. */
function areasText({ smallestRelative, largestRelative }: BudgetEntry): string {
  const [low, high] = [smallestRelative, largestRelative].map((value) => formatSignificant(100 * value, 2));
  return low === high ? `${high!} %` : `${low!} to ${high!} %`;
}

function sensitivityText({ sensitivityKelvin, unit }: BudgetEntry): string {
  if (sensitivityKelvin === null) return '–';
  return `${formatSignificant(sensitivityKelvin, 2)} K${unit === '1' ? '' : ` per ${unit}`}`;
}

/** What the components come to, in one sentence; empty without a temperature. */
export function budgetSummary({
  sigmaKelvin,
  coverage,
  effectiveDegreesOfFreedom: freedom,
}: Diagnosis['temperature']): string {
  if (sigmaKelvin === null) return '';
  const known =
    freedom === null
      ? 'all components count as known'
      : `${formatAtPlace(Math.floor(freedom), 0)} effective degrees of freedom`;
  const factor = formatSignificant(coverageFactor(coverage, freedom ?? Infinity), 3);
  return `Combined standard uncertainty ${formatSignificant(sigmaKelvin, 2)} K; ${known}, so the interval of 1/T reaches ${factor} standard uncertainties either way (${formatPercent(coverage)}).`;
}
