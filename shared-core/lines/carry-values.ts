import { lineBase, segmentBase, type JointProblem } from './joint-problem.ts';

/** The values of a fit as a start for a problem that may have further lines, those without light; lines are known by id. */
export function carryValues(
  from: JointProblem,
  to: JointProblem,
  values: Float64Array,
): ReadonlyMap<number, number> {
  const start = new Map(Array.from(to.lines.keys(), (line) => [lineBase(line), 0]));
  const firstLine = lineBase(0);
  for (let k = 0; k < firstLine; k++) start.set(k, values[k]!);
  for (const [index, { id }] of from.lines.entries()) {
    const at = lineBase(to.lines.findIndex((line) => line.id === id)) - lineBase(index);
    for (let k = lineBase(index); k < lineBase(index + 1); k++) start.set(k + at, values[k]!);
  }
  const shift = segmentBase(to.lines.length, 0) - segmentBase(from.lines.length, 0);
  for (let k = segmentBase(from.lines.length, 0); k < values.length; k++) start.set(k + shift, values[k]!);
  return start;
}
