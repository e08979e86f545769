import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';

type IdentificationSections = Pick<Diagnosis, 'impurities' | 'benchFindings' | 'unassignedPeaks'>;

/** What else is in the tube, empty where it could not be looked for. */
export function identificationSections({ identification }: Evidence): IdentificationSections {
  if (identification === null) {
    return {
      impurities: [],
      benchFindings: [],
      unassignedPeaks: { count: 0, nearBalmerCount: 0, strongest: [] },
    };
  }
  const { impurities, findings, unassigned } = identification;
  return {
    impurities: [...impurities],
    benchFindings: findings.map((finding) => ({
      ...finding,
      evidenceFor: [...finding.evidenceFor],
      evidenceAgainst: [...finding.evidenceAgainst],
      wouldSettle: [...finding.wouldSettle],
    })),
    unassignedPeaks: {
      ...unassigned,
      strongest: unassigned.strongest.map((peak) => ({ ...peak, candidates: [...peak.candidates] })),
    },
  };
}
