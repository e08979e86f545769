import { type Check, type Verdict, verdictSchema } from '../../../shared-core/diagnosis/diagnosis.ts';
import { formatExact, formatSignificant } from '../../../shared-core/text/format-number.ts';
import { Quantity } from '../../ui/quantity.tsx';
import { Prose } from '../../ui/prose.tsx';
import { Section } from '../../ui/section.tsx';
import { markClass, VerdictMark } from '../../ui/verdict-mark.tsx';
import { worstFirst } from './worst-first.ts';

/** Can it be trusted? What each check saw and what to do, the worst first, the sound ones folded. */
export function ChecksSection({ checks }: { readonly checks: readonly Check[] }) {
  const ordered = worstFirst(checks);
  const open = ordered.filter((check) => check.verdict !== 'sound');
  const sound = ordered.filter((check) => check.verdict === 'sound');
  return (
    <Section title="Can it be trusted?" className="checks" summary={countText(checks)}>
      <ul className="check-list">
        {open.map((check) => (
          <CheckRow key={check.id} check={check} />
        ))}
      </ul>
      {sound.length > 0 && (
        <details className="sound-checks" open={open.length === 0}>
          <summary>
            <VerdictMark kind="sound" /> {sound.length} sound
          </summary>
          <ul className="check-list">
            {sound.map((check) => (
              <CheckRow key={check.id} check={check} />
            ))}
          </ul>
        </details>
      )}
    </Section>
  );
}

function CheckRow({ check }: { readonly check: Check }) {
  const facts = Object.entries(check.facts).filter(([, value]) => value !== null && value !== '');
  return (
    <li className="check-row">
      <span className={`check-verdict ${markClass[check.verdict]}`}>
        <VerdictMark kind={check.verdict} /> {check.verdict}
      </span>
      <div>
        <p>
          <strong className="check-name">{words(check.id)}</strong> <Prose text={check.text} />
        </p>
        {check.remedy !== '' && (
          <p className="check-remedy">
            <Prose text={check.remedy} />
          </p>
        )}
        {facts.length > 0 && (
          <dl className="facts">
            {facts.map(([name, value]) => (
              <div key={name}>
                <dt>{factName(name)}</dt>
                <dd>
                  <Quantity text={factText(value)} />
                </dd>
              </div>
            ))}
          </dl>
        )}
      </div>
    </li>
  );
}

function countText(checks: readonly Check[]): string {
  const count = (verdict: Verdict): number => checks.filter((check) => check.verdict === verdict).length;
  return verdictSchema.options
    .toReversed()
    .filter((verdict) => count(verdict) > 0)
    .map((verdict) => `${String(count(verdict))} ${verdict}`)
    .join(', ');
}

const words = (id: string): string => {
  const text = id.replaceAll('-', ' ');
  return text.charAt(0).toUpperCase() + text.slice(1);
};

/** "pValue" is "p value". */
const factName = (name: string): string =>
  name.replace(/([A-Z]+)/g, (letters) => ` ${letters.toLowerCase()}`);

function factText(value: Check['facts'][string]): string {
  if (typeof value === 'number') {
    return Number.isInteger(value) && Math.abs(value) < 1e6
      ? formatExact(value)
      : formatSignificant(value, 3);
  }
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return value ?? '–';
}
