import type { OpticalDepthFinding } from '../../optical-depth/finding.ts';
import type { Check } from '../diagnosis.ts';
import { listNames, usedFits, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** A line that keeps this much of its light in the tube moves the temperature more than most response tables do. */
const noticeableLoss = 0.03;

/** What the depths measured with a mirror or a source mean for the lines in use; null where none was measured. */
export function opticalDepthCheck(evidence: Evidence): Check | null {
  const known = evidence.opticalDepths.filter(({ status }) => status !== 'not-determined');
  if (known.length === 0) return null;
  const used = new Set(usedFits(evidence).map(({ id }) => id));
  const dimmed = [
    ...new Set(
      known
        .filter(({ lineId, areaFactor }) => used.has(lineId) && (areaFactor ?? 1) < 1 - noticeableLoss)
        .map(({ lineId }) => lineId),
    ),
  ];
  const contrary = disagreement(known);
  const isLeft = dimmed.length > 0 && !evidence.isSelfAbsorptionApplied;
  const lowest = known.reduce((so, { areaFactor }) => Math.min(so, areaFactor ?? 1), 1);
  const depths = known.filter(({ status }) => status === 'measured');
  return {
    id: 'optical-depth',
    verdict: isLeft || contrary !== null ? 'use with care' : 'sound',
    facts: {
      measuredLines: depths.map(({ lineId, method }) => `${lineId} ${method}`).join(', '),
      dimmedLines: dimmed.join(' '),
      lowestAreaFactor: lowest,
      columnsAgree: contrary === null,
    },
    text: [
      depths.length === 0
        ? 'No line was seen absorbed with what stands behind the tube.'
        : `Measured apart from the emission, ${listNames([...new Set(depths.map(({ lineId }) => lineId))])} ${depths.length === 1 ? 'is' : 'are'} absorbed in the tube.`,
      dimmed.length === 0
        ? 'No line in use loses a noticeable part of its light.'
        : `Of the lines in use ${listNames(dimmed)} ${dimmed.length === 1 ? 'loses' : 'lose'} up to ${plain(100 * (1 - lowest), 2)} %${evidence.isSelfAbsorptionApplied ? '; the temperature is corrected for self-absorption' : ', for which the temperature is not corrected'}.`,
      contrary === null ? '' : `${contrary} show different columns of absorbing atoms.`,
    ]
      .filter((text) => text !== '')
      .join(' '),
    remedy:
      contrary !== null
        ? 'Record the pair again, one right after the other, with mirror or source filling the same field.'
        : isLeft
          ? 'Leave these lines out, or ask for the correction (analysis.selfAbsorption "correct").'
          : '',
  };
}

/** Two measurements whose columns exclude each other, in words; lines of one lower level share one column. */
function disagreement(known: readonly OpticalDepthFinding[]): string | null {
  const named = ({ lineId, method }: OpticalDepthFinding): string =>
    `${lineId} by ${method === 'mirror' ? 'the mirror' : 'absorption'}`;
  for (const [index, one] of known.entries()) {
    for (const other of known.slice(index + 1)) {
      const [a, b] = [one.columnPerSquareMetre, other.columnPerSquareMetre];
      const isApart =
        (a.high !== null && b.low !== null && a.high < b.low) ||
        (b.high !== null && a.low !== null && b.high < a.low);
      if (isApart) return `${named(one)} and ${named(other)}`;
    }
  }
  return null;
}
