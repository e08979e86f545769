import {
  certifiedDigits,
  deviationsFromScatter,
  fewestDigits,
  fitLinearSet,
  fitNonlinearSet,
  linearSets,
  nonlinearSets,
} from '../support/strd/data-sets.ts';
import { wantedDigits } from '../support/strd/wanted-digits.ts';

/**
 * Digits agreed with the certified values, the worst parameter of each set: 27 nonlinear sets from both of NIST's starts, at
 * most 11 digits, and 11 linear ones, at most 15. Where fewer are wanted than usual, wanted-digits.ts says why.
 */
export function strdTable(): string[][] {
  // npm runs its scripts in the project's folder.
  const root = process.cwd();
  const nonlinear = nonlinearSets(root).flatMap((set) =>
    set.starts.map((start, index) => {
      const fit = fitNonlinearSet(set, [start]);
      const values = fewestDigits(fit.values, set.values, certifiedDigits.nonlinear);
      const deviations = fewestDigits(deviationsFromScatter(fit), set.deviations, certifiedDigits.nonlinear);
      const how = [fit.status, String(fit.evaluationCount)] as const;
      return row(set.name, 'nonlinear', `start ${String(index + 1)}`, values, deviations, how);
    }),
  );
  const linear = linearSets(root).map((set) => {
    const fit = fitLinearSet(set);
    const values = fit === null ? 0 : fewestDigits(fit.values, set.values, certifiedDigits.linear);
    const deviations =
      fit === null ? 0 : fewestDigits(fit.deviations, set.deviations, certifiedDigits.linear);
    return row(set.name, 'linear', '-', values, deviations, [fit === null ? 'singular' : 'solved', '-']);
  });
  return [
    ['set', 'start', 'parameters', 'std. dev.', 'wanted', 'status', 'evaluations', ''],
    ...nonlinear,
    ...linear,
  ];
}

function row(
  name: string,
  kind: 'nonlinear' | 'linear',
  start: string,
  values: number,
  deviations: number,
  [status, evaluations]: readonly [string, string],
): string[] {
  const wanted = wantedDigits(name, kind);
  const isMet = status !== 'singular' && values >= wanted.values && deviations >= wanted.deviations;
  const digits = [
    values.toFixed(1),
    deviations.toFixed(1),
    `${String(wanted.values)}, ${String(wanted.deviations)}`,
  ];
  return [name, start, ...digits, status, evaluations, isMet ? '' : 'MISSED'];
}
