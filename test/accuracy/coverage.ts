import { coverageCases, runCoverageCase, type CoverageResult } from './coverage-cases.ts';

const percent = (part: number, whole: number): string =>
  whole === 0
    ? '-'
    : `${((100 * part) / whole).toFixed(1)} +- ${((100 * Math.sqrt((part / whole) * (1 - part / whole))) / Math.sqrt(whole)).toFixed(1)} %`;

const rowOf = (result: CoverageResult): string[] => [
  result.name,
  String(result.drawCount),
  String(result.drawCount - result.measured),
  percent(result.covered, result.measured),
  result.meanPull.toFixed(3),
  result.rmsPull.toFixed(3),
  result.rmsKelvin.toFixed(1),
  result.rmsOverBound === null ? '-' : result.rmsOverBound.toFixed(3),
  percent(result.densityCovered, result.densityMeasured),
  result.densityMeasured === 0 ? '-' : result.densityMeanPull.toFixed(3),
];

/** Coverage of the 95 % interval, bias and sharpness on simulated recordings with known truth. */
export function coverageTable(drawCount: number): string[][] {
  return [
    [
      'case',
      'draws',
      'refused',
      'T covered',
      'bias/sigma',
      'rms/sigma',
      'rms K',
      'rms/bound',
      'Ne covered',
      'Ne bias/sigma',
    ],
    ...coverageCases.map((each) => rowOf(runCoverageCase(each, drawCount))),
  ];
}

/** The same recordings fitted jointly and line by line: what sharing brings. */
export function jointTable(drawCount: number): string[][] {
  return [
    ['case', 'rms K joint', 'rms K line by line', 'ratio'],
    ...coverageCases.map((each) => {
      const joint = runCoverageCase(each, drawCount);
      const single = runCoverageCase(each, drawCount, { fit: 'line-by-line' });
      return [
        each.name,
        joint.rmsKelvin.toFixed(1),
        single.rmsKelvin.toFixed(1),
        (joint.rmsKelvin / single.rmsKelvin).toFixed(3),
      ];
    }),
  ];
}
