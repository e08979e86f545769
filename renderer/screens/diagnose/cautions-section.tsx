import type { Bench } from '../../../shared-core/bench/bench.ts';
import { cautionsFor, notASafetyDevice } from '../../../shared-core/safety/cautions.ts';
import { Section } from '../../ui/section.tsx';

/** The cautions of this bench in short, and the way to the Safety place. */
export function CautionsSection({
  bench,
  onSafety,
}: {
  readonly bench: Bench;
  readonly onSafety: () => void;
}) {
  const cautions = cautionsFor(bench);
  const hazards = [...new Set(cautions.map((caution) => caution.hazard))];
  return (
    <Section
      title="Cautions"
      className="cautions"
      summary={`the first of each hazard; all ${String(cautions.length)} in Safety`}
    >
      <ul className="hazard-list">
        {hazards.map((hazard) => {
          const [first] = cautions.filter((caution) => caution.hazard === hazard);
          return (
            <li key={hazard}>
              <strong>{hazard}</strong> <span>{first?.text}</span>
            </li>
          );
        })}
      </ul>
      <p>
        {notASafetyDevice}{' '}
        <button type="button" onClick={onSafety}>
          All cautions
        </button>
      </p>
    </Section>
  );
}
