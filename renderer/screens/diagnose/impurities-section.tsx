import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { formatSignificant } from '../../../shared-core/text/format-number.ts';
import { Section } from '../../ui/section.tsx';

/** What else is in the tube? Each finding with its evidence and what it means at the bench. */
export function ImpuritiesSection({ impurities }: { readonly impurities: Diagnosis['impurities'] }) {
  return (
    <Section
      title="What else is in the tube?"
      className="impurities"
      summary={impurities.length === 0 ? 'nothing found' : `${String(impurities.length)} found`}
    >
      {impurities.length === 0 ? (
        <p>No line or bandhead of the shipped table stands out of the noise outside the fitted windows.</p>
      ) : (
        <table className="numbers">
          <thead>
            <tr>
              <th scope="col">species</th>
              <th scope="col">evidence</th>
              <th scope="col">signal to noise</th>
              <th scope="col">meaning</th>
            </tr>
          </thead>
          <tbody>
            {impurities.map((finding) => (
              <tr key={`${finding.species} ${finding.evidence}`}>
                <th scope="row">{finding.species}</th>
                <td className="is-text">{finding.evidence}</td>
                <td>{formatSignificant(finding.signalToNoise, 2)}</td>
                <td className="is-text">{finding.meaning}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </Section>
  );
}
