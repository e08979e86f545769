import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { equilibriumWord, ratioTemperature } from '../../../shared-core/report/cross-checks-section.ts';
import { formatDensityNumber } from '../../../shared-core/report/format-answer.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import {
  formatPercent,
  formatSignificant,
  formatWithSigma,
} from '../../../shared-core/text/format-number.ts';
import type { ChoicesMade } from '../../state/inputs.ts';
import { Prose } from '../../ui/prose.tsx';
import { Quantity } from '../../ui/quantity.tsx';
import { Section } from '../../ui/section.tsx';
import { ChoicesGroup } from './choices-group.tsx';

export interface CrossChecksSectionProps {
  readonly diagnosis: Diagnosis;
  readonly onChoose: (choices: ChoicesMade) => void;
}

/** What stands behind the answer: other ways to the same numbers, and what the plasma has to be for them to mean it. */
export function CrossChecksSection({ diagnosis, onChoose }: CrossChecksSectionProps) {
  const { selfAbsorption, gasTemperature, deuterium, equilibrium, companions, instrumentProfile } = diagnosis;
  return (
    <Section title="What stands behind it?" className="cross-checks" summary={summaryOf(diagnosis)}>
      <div className="side-by-side">
        <div>
          <LineRatios ratios={diagnosis.lineRatios} />
          <dl className="findings">
            <Finding name="self-absorption" text={selfAbsorption.text} />
            <Finding name="deuterium" text={deuterium.text} />
            <Finding name="gas temperature" text={gasTemperature.text} />
            {instrumentProfile !== null && <Finding name="instrument" text={instrumentProfile.text} />}
            {companions.map(({ lineId, species, text }) => (
              <Finding
                key={text}
                name={`${species === 'neighbour' ? 'beside' : 'under'} ${lineLabel(lineId)}`}
                text={text}
              />
            ))}
          </dl>
        </div>
        <div>
          <Levels equilibrium={equilibrium} />
          <p>
            <Prose text={equilibrium.text} />
          </p>
          <p>
            <Prose text={equilibrium.saha.text} />
          </p>
          <p>
            <Prose text={equilibrium.seriesLimit.text} />
          </p>
          <ChoicesGroup diagnosis={diagnosis} onChoose={onChoose} />
        </div>
      </div>
    </Section>
  );
}

function Finding({ name, text }: { readonly name: string; readonly text: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>
        <Prose text={text} />
      </dd>
    </div>
  );
}

function LineRatios({ ratios }: { readonly ratios: Diagnosis['lineRatios'] }) {
  if (ratios.length === 0) return <p>There are not two lines in use to compare.</p>;
  return (
    <table className="numbers">
      <caption>Temperatures of two lines at a time</caption>
      <thead>
        <tr>
          <th scope="col">lines</th>
          <th scope="col">ratio</th>
          <th scope="col">at infinite T</th>
          <th scope="col">temperature, K</th>
        </tr>
      </thead>
      <tbody>
        {ratios.map((ratio) => (
          <tr key={`${ratio.numerator} ${ratio.denominator}`}>
            <th scope="row">
              {lineLabel(ratio.numerator)} ∕ {lineLabel(ratio.denominator)}
            </th>
            <td>{ratio.ratio === null ? '–' : formatWithSigma(ratio.ratio, ratio.ratioSigma)}</td>
            <td>{formatSignificant(ratio.limit, 4)}</td>
            <td title={ratio.text}>{ratioTemperature(ratio)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Which levels hold equilibrium with the electrons, and what density that takes. */
function Levels({ equilibrium }: { readonly equilibrium: Diagnosis['equilibrium'] }) {
  const rows = [
    ...equilibrium.levels.map(({ upperLevel, lineIds, neededPerCubicMetre, status }) => ({
      name: `n = ${String(upperLevel)} (${lineIds.map(lineLabel).join(', ')})`,
      neededPerCubicMetre,
      status,
    })),
    { name: 'all, ground state too', ...equilibrium.complete },
  ];
  return (
    <table className="numbers">
      <caption>Equilibrium with the electrons</caption>
      <thead>
        <tr>
          <th scope="col">level</th>
          <th scope="col">density it takes, m⁻³</th>
          <th scope="col">reached</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ name, neededPerCubicMetre, status }) => (
          <tr key={name}>
            <th scope="row">{name}</th>
            <td>
              {neededPerCubicMetre === null ? (
                '–'
              ) : (
                <Quantity text={formatDensityNumber(neededPerCubicMetre)} />
              )}
            </td>
            <td>{equilibriumWord[status]}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function summaryOf({ selfAbsorption, deuterium }: Diagnosis): string {
  const parts: string[] = [];
  if (selfAbsorption.status === 'suspected') parts.push('self-absorption suspected');
  if (deuterium.status === 'measured' && deuterium.fraction !== null)
    parts.push(`${formatPercent(deuterium.fraction, 2)} deuterium`);
  return parts.join(', ');
}
