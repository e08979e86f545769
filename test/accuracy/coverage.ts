import { boundsOf, coverageCases } from './coverage-cases.ts';
import { runCoverageCase, type Tally } from './run-coverage.ts';
import { rate } from './rate.ts';

const covered = ({ covered: held, measured }: Tally): string => (measured === 0 ? '-' : rate(held, measured));
/** A mean of n pulls has the error 1 / sqrt(n), a root mean square 1 / sqrt(2 n). */
const plain = (value: number, digits: number): string => (Number.isNaN(value) ? '-' : value.toFixed(digits));

/** Coverage of the 95 % interval, bias and sharpness on simulated recordings with known truth. */
export function coverageTable(drawCount: number): string[][] {
  const head = (of: string): string[] =>
    ['refused', 'covered', 'bias/sigma', 'rms/sigma', 'rms/bound'].map((name) => `${of} ${name}`);
  const cells = (of: Tally, bound: number): string[] => [
    String(drawCount - of.measured),
    covered(of),
    plain(of.meanPull, 3),
    plain(of.rmsPull, 3),
    plain(of.rms / bound, 3),
  ];
  return [
    ['case', ...head('T'), 'T rms, K', ...head('Ne')],
    ...coverageCases.map((each) => {
      const bounds = boundsOf(each);
      const { temperature, density } = runCoverageCase(each, drawCount);
      return [
        each.name,
        ...cells(temperature, bounds.kelvin),
        plain(temperature.rms, 1),
        ...cells(density, bounds.lnDensity),
      ];
    }),
    [
      `errors of ${String(drawCount)} draws: bias/sigma ${(1 / Math.sqrt(drawCount)).toFixed(3)}, ` +
        `rms ${(100 / Math.sqrt(2 * drawCount)).toFixed(1)} %`,
    ],
  ];
}

/** The same recordings fitted jointly and line by line: what sharing brings. */
export function jointTable(drawCount: number): string[][] {
  return [
    ['case', 'T rms, K, joint', 'line by line', 'ratio', 'covered joint', 'covered line by line'],
    ...coverageCases.map((each) => {
      const joint = runCoverageCase(each, drawCount).temperature;
      const single = runCoverageCase(each, drawCount, { fit: 'line-by-line' }).temperature;
      return [
        each.name,
        plain(joint.rms, 1),
        plain(single.rms, 1),
        plain(joint.rms / single.rms, 3),
        covered(joint),
        covered(single),
      ];
    }),
  ];
}
