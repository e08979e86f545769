import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { budgetColumns, budgetSummary } from '../../../shared-core/report/budget-table.ts';
import { isTemperatureWithheld } from '../../../shared-core/report/format-answer.ts';
import { formatExact, formatPercent, formatSignificant } from '../../../shared-core/text/format-number.ts';
import type { ChoicesMade } from '../../state/inputs.ts';
import { Prose } from '../../ui/prose.tsx';
import { Section } from '../../ui/section.tsx';

export interface BudgetSectionProps {
  readonly diagnosis: Diagnosis;
  readonly onChoose: (choices: ChoicesMade) => void;
}

/** What limits it? The parts of the uncertainty, the largest first, each with what would bring it down. */
export function BudgetSection({ diagnosis, onChoose }: BudgetSectionProps) {
  const { budget, temperature } = diagnosis;
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
        <>
          <ul className="budget-list">
            {ordered.map((part) => (
              <li key={part.source}>
                <span className="budget-source">{part.source}</span>
                <svg
                  className="budget-bar"
                  viewBox="0 0 100 10"
                  preserveAspectRatio="none"
                  aria-hidden="true"
                >
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
          <BudgetTable rows={ordered} caption={budgetSummary(temperature)} />
          {!isTemperatureWithheld(diagnosis) && (
            <SecondOpinion monteCarlo={diagnosis.monteCarlo} onChoose={onChoose} />
          )}
        </>
      )}
    </Section>
  );
}

/** The same in the numbers that a metrologist asks for. */
function BudgetTable({ rows, caption }: { readonly rows: Diagnosis['budget']; readonly caption: string }) {
  return (
    <table className="numbers">
      <caption>{caption}</caption>
      <thead>
        <tr>
          {budgetColumns.map(({ heading }) => (
            <th key={heading} scope="col">
              {heading}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.source}>
            {budgetColumns.map(({ heading, cell }, index) =>
              index === 0 ? (
                <th key={heading} scope="row">
                  {cell(row)}
                </th>
              ) : (
                <td key={heading}>{cell(row)}</td>
              ),
            )}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** The seed is fixed: the same recording gives the same trials, and a report can be checked. */
const seed = 1;

/** The interval by drawing every input, on request. */
function SecondOpinion({
  monteCarlo,
  onChoose,
}: {
  readonly monteCarlo: Diagnosis['monteCarlo'];
  readonly onChoose: (choices: ChoicesMade) => void;
}) {
  if (monteCarlo === null)
    return (
      <button type="button" onClick={() => onChoose({ monteCarlo: { seed } })}>
        Check the interval by Monte Carlo
      </button>
    );
  return (
    <div className="second-opinion">
      <p>
        <Prose text={monteCarlo.text} /> Seed {formatExact(monteCarlo.seed)}.
      </p>
      <button type="button" onClick={() => onChoose({ monteCarlo: undefined })}>
        Drop the Monte Carlo check
      </button>
    </div>
  );
}
