import { type Check, verdictSchema } from '../../../shared-core/diagnosis/diagnosis.ts';

/** The schema lists the verdicts from best to worst. */
const rank = (check: Check): number => verdictSchema.options.indexOf(check.verdict);

/** Checks in the order of their weight, those of equal weight as they came. */
export function worstFirst(checks: readonly Check[]): readonly Check[] {
  return [...checks].sort((a, b) => rank(b) - rank(a));
}
