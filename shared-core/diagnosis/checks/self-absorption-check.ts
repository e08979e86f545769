import type { Check } from '../diagnosis.ts';
import { usedFits, type Evidence } from '../evidence.ts';
import { selfAbsorptionSection } from '../self-absorption.ts';

/** Whether H-alpha is dimmed by the gas it comes from. */
export function selfAbsorptionCheck(evidence: Evidence): Check {
  const { selfAbsorption: found } = evidence;
  const section = selfAbsorptionSection(evidence);
  const isInUse = usedFits(evidence).some(({ id }) => id === 'H-alpha');
  const isDoubtful = found.status === 'suspected' || (found.status === 'not-testable' && isInUse);
  return {
    id: 'self-absorption',
    verdict: isDoubtful ? 'use with care' : 'sound',
    facts: {
      status: section.status,
      deficit: section.deficit,
      significance: found.significance,
      opticalDepth: section.opticalDepth,
      high: section.high,
      areaFactor: section.areaFactor,
      isConsistent: section.isConsistent,
      isApplied: section.isApplied,
    },
    text: section.text,
    remedy: isDoubtful ? remedyFor(evidence) : '',
  };
}

function remedyFor({ selfAbsorption: found, isSelfAbsorptionApplied, opticalDepths }: Evidence): string {
  if (found.status === 'not-testable') return 'Bring in two further lines and a response table to test it.';
  const isMeasured = opticalDepths.some(
    ({ lineId, status }) => lineId === 'H-alpha' && status !== 'not-determined',
  );
  const confirm = isMeasured
    ? ''
    : 'Put a mirror behind the tube: what does not grow as the other lines do is absorbed.';
  if (isSelfAbsorptionApplied || found.corrected === null) return confirm;
  return `Leave H-alpha out, or ask for the correction (analysis.selfAbsorption "correct"). ${confirm}`.trimEnd();
}
