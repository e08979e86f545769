import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { formatPercent, formatSignificant } from '../../../shared-core/text/format-number.ts';
import { Section } from '../../ui/section.tsx';

export interface BudgetSectionProps {
  readonly budget: Diagnosis['budget'];
  readonly temperature: Diagnosis['temperature'];
}

/** What limits it? The parts of the uncertainty, the largest first, each with what would bring it down. */
export function BudgetSection({ budget, temperature }: BudgetSectionProps) {
  const ordered = [...budget].sort((a, b) => b.share - a.share);
  const sigma = temperature.sigmaKelvin;
  return (
    <Section
      title="What limits it?"
      className="budget"
      summary={sigma === null ? '' : `standard uncertainty ${formatSignificant(sigma, 2)}\u00a0K in all`}
    >
      {ordered.length === 0 ? (
        <p>No temperature was measured, so there is no uncertainty to divide up.</p>
      ) : (
        <ul className="budget-list">
          {ordered.map((part) => (
            <li key={part.source}>
              <span className="budget-source">{part.source}</span>
              <svg className="budget-bar" viewBox="0 0 100 10" preserveAspectRatio="none" aria-hidden="true">
                <rect className="budget-whole" width="100" height="10" />
                <rect className="budget-part" width={Math.max(0.5, 100 * part.share)} height="10" />
              </svg>
              <span className="budget-share">{formatPercent(part.share)}</span>
              <span className="budget-sigma">
                {formatSignificant(part.sigmaKelvin, 2)} <span className="unit">K</span>
              </span>
              <span className="budget-remedy">{part.remedy}</span>
            </li>
          ))}
        </ul>
      )}
    </Section>
  );
}
