import { choleskyFactor, choleskySolve } from '../numeric/cholesky.ts';
import type { MatchedLine, RecordedAxisMap } from './recorded-axis-map.ts';

const minLinesForBow = 4;

/**
 * Least-squares axis map through the matched lines: offset and stretch, and a bow term when four or more lines ask for it.
 *
 * Weights follow the strength of the peak but saturate, because the position of a strong peak is limited by the
 * axis itself. The bow is kept only when it brings the residuals down by more than a factor of two.
 *
 * @param fallback  used when fewer than two lines are matched
 * @check  test/property/axis-registration.test.ts
 */
export function fitAxisPolynomial(
  matched: readonly MatchedLine[],
  pivotNm: number,
  fallback: { readonly offsetNm: number; readonly stretch: number },
): RecordedAxisMap {
  const straight = solve(matched, pivotNm, 2);
  if (matched.length < 2 || straight === null) {
    return { pivotNm, offsetNm: fallback.offsetNm, stretch: fallback.stretch, bowPerNm: 0 };
  }
  const linear = { pivotNm, offsetNm: straight[0]!, stretch: straight[1]!, bowPerNm: 0 };
  if (matched.length < minLinesForBow) return linear;
  const curved = solve(matched, pivotNm, 3);
  if (curved === null) return linear;
  const bowed = { pivotNm, offsetNm: curved[0]!, stretch: curved[1]!, bowPerNm: curved[2]! };
  const better = misfit(matched, bowed) * 4 < misfit(matched, linear);
  return better ? bowed : linear;
}

/** Where a line of known wavelength lies on the recorded axis, nm. */
export function toRecordedNm(map: RecordedAxisMap, referenceNm: number): number {
  const u = referenceNm - map.pivotNm;
  return referenceNm + map.offsetNm + map.stretch * u + map.bowPerNm * u * u;
}

/** The inverse of toRecordedNm, by fixed point; converges because stretch and bow are small. nm. */
export function toRegisteredNm(map: RecordedAxisMap, recordedNm: number): number {
  let nm = recordedNm - map.offsetNm;
  for (let i = 0; i < 6; i++) nm += recordedNm - toRecordedNm(map, nm);
  return nm;
}

function solve(matched: readonly MatchedLine[], pivotNm: number, terms: number): Float64Array | null {
  const scaleNm = 100;
  const normal = new Float64Array(terms * terms);
  const right = new Float64Array(terms);
  for (const { referenceNm, peak } of matched) {
    const u = (referenceNm - pivotNm) / scaleNm;
    const basis = [1, u, u * u];
    const weight = weightOf(peak.signalToNoise);
    for (let i = 0; i < terms; i++) {
      right[i] = right[i]! + weight * basis[i]! * (peak.recordedNm - referenceNm);
      for (let j = 0; j < terms; j++) {
        normal[i * terms + j] = normal[i * terms + j]! + weight * basis[i]! * basis[j]!;
      }
    }
  }
  if (!choleskyFactor(normal, terms)) return null;
  choleskySolve(normal, terms, right);
  for (let i = 1; i < terms; i++) right[i] = right[i]! / (i === 1 ? scaleNm : scaleNm * scaleNm);
  return right;
}

function weightOf(signalToNoise: number): number {
  return (signalToNoise * signalToNoise) / (1 + (signalToNoise * signalToNoise) / 400);
}

function misfit(matched: readonly MatchedLine[], map: RecordedAxisMap): number {
  let sum = 0;
  for (const { referenceNm, peak } of matched) {
    const miss = peak.recordedNm - toRecordedNm(map, referenceNm);
    sum += weightOf(peak.signalToNoise) * miss * miss;
  }
  return sum;
}
