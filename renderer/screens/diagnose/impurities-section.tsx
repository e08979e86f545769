import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import {
  findingParts,
  impurityColumns,
  nothingFound,
  unassignedText,
} from '../../../shared-core/report/impurities-section.ts';
import { Section } from '../../ui/section.tsx';

/** What else is in the tube? Each species with its evidence, and what they mean together at the bench. */
export function ImpuritiesSection({ diagnosis }: { readonly diagnosis: Diagnosis }) {
  const { impurities, benchFindings } = diagnosis;
  const unassigned = unassignedText(diagnosis);
  return (
    <Section
      title="What else is in the tube?"
      className="impurities"
      summary={impurities.length === 0 ? 'nothing found' : `${String(impurities.length)} found`}
    >
      {impurities.length === 0 ? (
        <p>{nothingFound(diagnosis)}</p>
      ) : (
        <table className="numbers">
          <thead>
            <tr>
              <th scope="col">species</th>
              {impurityColumns.map(({ heading }) => (
                <th key={heading} scope="col">
                  {heading}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {impurities.map((found) => (
              <tr key={found.emitter}>
                <th scope="row">{found.emitter}</th>
                {impurityColumns.map(({ heading, cell }) => (
                  <td key={heading} className={heading === 'S/N' ? undefined : 'is-text'}>
                    {cell(found)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {benchFindings.map((finding) => (
        <BenchFinding key={finding.id} finding={finding} />
      ))}
      {unassigned !== '' && <p>{unassigned}</p>}
    </Section>
  );
}

function BenchFinding({ finding }: { readonly finding: Diagnosis['benchFindings'][number] }) {
  return (
    <div className="bench-finding">
      <h3>
        {finding.title} <span className="how-sure">{finding.confidence}</span>
      </h3>
      <dl>
        {findingParts(finding).map(([heading, lines]) => (
          <div key={heading}>
            <dt>{heading}</dt>
            {lines.map((line) => (
              <dd key={line}>{line}</dd>
            ))}
          </div>
        ))}
      </dl>
    </div>
  );
}
