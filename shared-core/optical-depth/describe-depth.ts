import { normalQuantile } from '../numeric/distributions.ts';
import type { Bounded, OpticalDepthFinding } from './finding.ts';
import type { ObservedLine } from './observed-line.ts';
import type { Slab } from './slab.ts';

/** An absorption that stands out by this many standard uncertainties is measured; below it has a limit. */
export const leastSignificance = 2;

/** Depth that a measurement gives when it is read `sigmas` standard uncertainties too high; null beyond the largest depth. */
export type DepthReader = (slab: Slab, sigmas: number) => number | null;

/**
 * Value and interval of a depth and of its column. The interval is that of what was measured, read through the law
 * between depth and light; what the gas's shape leaves open adds in quadrature, cause by cause.
 *
 * @param significance  of the absorption
 */
export function boundedDepth(
  observed: ObservedLine,
  significance: number,
  coverage: number,
  read: DepthReader,
): Pick<OpticalDepthFinding, 'status' | 'opticalDepth' | 'columnPerSquareMetre'> {
  const isSeen = significance > leastSignificance;
  const sigmas = normalQuantile(isSeen ? 0.5 * (1 + coverage) : coverage);
  const scaled = (unit: (slab: Slab) => number): Bounded => {
    const at = (slab: Slab, by: number): number | null => {
      const depth = read(slab, by);
      return depth === null ? null : depth * unit(slab);
    };
    const middle = at(observed.best, 0);
    const low = at(observed.best, -sigmas);
    const high = at(observed.best, sigmas);
    if (!isSeen) {
      const widest = [
        high,
        ...observed.others.flatMap((each) => [at(each.low, sigmas), at(each.high, sigmas)]),
      ];
      // One sigma of the shape either way; a limit is stated for the least favourable of them.
      return {
        value: null,
        low: null,
        high: widest.includes(null) ? null : Math.max(...widest.map((value) => value ?? 0)),
      };
    }
    if (middle === null) return { value: null, low, high: null };
    let below = (middle - (low ?? middle)) * (middle - (low ?? middle));
    let above = high === null ? null : (high - middle) * (high - middle);
    for (const each of observed.others) {
      const ends = [at(each.low, 0), at(each.high, 0)];
      const down = Math.max(0, ...ends.map((end) => middle - (end ?? middle)));
      below += sigmas * sigmas * down * down;
      if (ends.includes(null)) above = null;
      const up = Math.max(0, ...ends.map((end) => (end ?? middle) - middle));
      if (above !== null) above += sigmas * sigmas * up * up;
    }
    return {
      value: middle,
      low: Math.max(0, middle - Math.sqrt(below)),
      high: above === null ? null : middle + Math.sqrt(above),
    };
  };
  const opticalDepth = scaled(() => 1);
  const isBounded = isSeen || opticalDepth.high !== null;
  return {
    status: isSeen ? 'measured' : isBounded ? 'upper-limit' : 'not-determined',
    opticalDepth,
    columnPerSquareMetre: scaled((slab) => slab.columnPerDepth),
  };
}

/** Nothing known of a line, with the reason. */
export function notDetermined(
  lineId: string,
  method: OpticalDepthFinding['method'],
  reason: string,
): OpticalDepthFinding {
  const unknown: Bounded = { value: null, low: null, high: null };
  return {
    lineId,
    method,
    status: 'not-determined',
    reason,
    opticalDepth: unknown,
    columnPerSquareMetre: unknown,
    areaFactor: null,
    areaFactorFrom: null,
    seen: null,
    isResolved: false,
    profile: [],
  };
}

/**
 * Area factors by species scaling: lines of one lower level share its column, so the best measured column predicts what
 * every line loses, by f lambda^2 and its own shape.
 */
export function withAreaFactors(
  findings: readonly OpticalDepthFinding[],
  slabs: ReadonlyMap<string, Slab>,
): readonly OpticalDepthFinding[] {
  const relativeWidth = ({ columnPerSquareMetre: { value, low, high } }: OpticalDepthFinding): number =>
    value === null || low === null || high === null ? Infinity : (high - low) / value;
  const measured = findings.filter(
    ({ status, opticalDepth }) => status === 'measured' && opticalDepth.value !== null,
  );
  if (measured.length === 0) return findings;
  const best = measured.reduce((so, next) => (relativeWidth(next) < relativeWidth(so) ? next : so));
  return findings.map((finding) => {
    const slab = slabs.get(finding.lineId);
    if (slab === undefined) return finding;
    const own = finding.status === 'measured' && finding.opticalDepth.value !== null ? finding : best;
    const depth = own.columnPerSquareMetre.value! / slab.columnPerDepth;
    return { ...finding, areaFactor: slab.escape(depth), areaFactorFrom: own.lineId };
  });
}
