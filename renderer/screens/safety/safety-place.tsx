import type { Bench } from '../../../shared-core/bench/bench.ts';
import { formatExact } from '../../../shared-core/text/format-number.ts';
import { type Caution, cautionsFor, notASafetyDevice } from '../../../shared-core/safety/cautions.ts';
import { safetyReferences } from '../../../shared-core/safety/references.ts';
import { Quantity } from '../../ui/quantity.tsx';
import { storedChargeFacts } from './stored-charge-facts.ts';

/** What to know before switching on, for the bench that is described. */
export function SafetyPlace({ bench }: { readonly bench: Bench }) {
  const cautions = cautionsFor(bench);
  const hazards = [...new Set(cautions.map((caution) => caution.hazard))];
  const sums = storedChargeFacts(bench);
  return (
    // A region that scrolls must be reachable by keyboard, and this one holds nothing else to focus.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
    <main className="safety" tabIndex={0}>
      <h1>Safety</h1>
      <p className="safety-limits">{notASafetyDevice}</p>
      <div className="safety-columns">
        <section aria-labelledby="safety-bench" className="safety-bench">
          <h2 id="safety-bench">{bench.name ?? 'No bench file'}</h2>
          <dl className="method-list">
            {benchFacts(bench).map(([name, value]) => (
              <div key={name}>
                <dt>{name}</dt>
                <dd>{value}</dd>
              </div>
            ))}
          </dl>
          <h2>Stored charge</h2>
          {sums.length === 0 ? (
            <p>
              State voltage, capacitance and bleed resistance of the supply in the bench file to have the sums
              here.
            </p>
          ) : (
            <dl className="safety-sums">
              {sums.map((sum) => (
                <div key={sum.name}>
                  <dt>{sum.name}</dt>
                  <dd>
                    <strong>
                      <Quantity text={sum.value} />
                    </strong>
                    <span className="fine-print">{sum.remark}</span>
                  </dd>
                </div>
              ))}
            </dl>
          )}
        </section>
        <div>
          {hazards.map((hazard) => (
            <HazardSection
              key={hazard}
              hazard={hazard}
              cautions={cautions.filter((caution) => caution.hazard === hazard)}
            />
          ))}
          <section aria-labelledby="safety-rules">
            <h2 id="safety-rules">Where the rules are written</h2>
            <p>An aid, not complete; the edition in force and the law where you are decide.</p>
            <dl className="method-list">
              {safetyReferences.map((reference) => (
                <div key={reference.name}>
                  <dt>{reference.name}</dt>
                  <dd>{reference.covers}</dd>
                </div>
              ))}
            </dl>
          </section>
        </div>
      </div>
    </main>
  );
}

function HazardSection(props: { readonly hazard: string; readonly cautions: readonly Caution[] }) {
  const id = `hazard-${props.hazard.replaceAll(' ', '-')}`;
  return (
    <section aria-labelledby={id} className="hazard">
      <h2 id={id}>{props.hazard.charAt(0).toUpperCase() + props.hazard.slice(1)}</h2>
      <ul>
        {props.cautions.map((caution) => (
          <li key={caution.id}>
            <p>{caution.text}</p>
            <p className="fine-print">Why here: {caution.appliesBecause}.</p>
          </li>
        ))}
      </ul>
    </section>
  );
}

function benchFacts(bench: Bench): readonly (readonly [string, string])[] {
  const { lamp, supply } = bench;
  const fact = (name: string, value: number | string | undefined, unit = ''): readonly [string, string] => [
    name,
    value === undefined ? 'not stated' : `${typeof value === 'number' ? formatExact(value) : value}${unit}`,
  ];
  return [
    fact('lamp', lamp?.id),
    fact('gas', lamp?.gas),
    fact('pressure', lamp?.pressurePa, ' Pa'),
    fact('open-circuit voltage', supply?.openCircuitVolts, ' V'),
    fact('current', supply?.currentMilliamps, ' mA'),
    fact('capacitance', supply?.capacitanceMicrofarads, ' µF'),
    fact('bleed resistance', supply?.bleedResistanceMegohms, ' MΩ'),
  ];
}
