import type { Check, Verdict } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';

const rank: Record<Verdict, number> = { sound: 0, 'use with care': 1, 'not defensible': 2 };

export const worseOf = (a: Verdict, b: Verdict): Verdict => (rank[a] >= rank[b] ? a : b);

/** Checks in the order that tells most: the one that stops a temperature first, then the worst. */
export function worstFirst(checks: readonly Check[]): Check[] {
  return [...checks].sort((a, b) => rank[b.verdict] - rank[a.verdict]);
}

/** The verdict is that of the worst check; a temperature that is no value is never sound. */
export function verdict(
  { temperature }: Pick<Evidence, 'temperature'>,
  checks: readonly Check[],
): { verdict: Verdict; text: string } {
  const floor: Verdict =
    temperature.status === 'measured'
      ? 'sound'
      : temperature.status === 'lower-limit'
        ? 'use with care'
        : 'not defensible';
  const overall = checks.reduce((worst, check) => worseOf(worst, check.verdict), floor);
  if (overall === 'sound') return { verdict: overall, text: 'All checks are sound.' };
  const worst = checks.find((check) => check.verdict === overall);
  const reason = worst === undefined ? `${capital(temperature.reason)}.` : worst.text;
  const advice = worst?.remedy ?? '';
  return { verdict: overall, text: advice === '' ? reason : `${reason} ${advice}` };
}

const capital = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}`;
