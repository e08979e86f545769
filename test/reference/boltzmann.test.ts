import { describe, expect, test } from 'vitest';
import { fitStraightLine } from '../../shared-core/numeric/fit-straight-line.ts';
import {
  populationOrdinate,
  twoLineTemperature,
  type AreaUnit,
  type PopulationLine,
} from '../../shared-core/physics/boltzmann.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

type Name = 'Halpha' | 'Hbeta' | 'Hgamma' | 'Hdelta' | 'Hepsilon';
const names: readonly Name[] = ['Halpha', 'Hbeta', 'Hgamma', 'Hdelta', 'Hepsilon'];

/** The tabulated constants with which the reference ratios were computed. */
const lines = Object.fromEntries(
  Object.entries(
    checkValue('boltzmann.ratios_power.T3000').inputs['lines'] as Record<
      Name,
      { lambda_nm: number; A: number; g: number; E_eV: number }
    >,
  ).map(([name, { lambda_nm, A, g, E_eV }]) => [
    name,
    { wavelengthNm: lambda_nm, transitionProbabilityPerS: A, upperWeight: g, upperEnergyEv: E_eV },
  ]),
) as Record<Name, PopulationLine>;

const units: readonly (readonly [string, AreaUnit])[] = [
  ['power', 'energy'],
  ['photon', 'photon'],
];

/** Temperature of the unweighted line through the ordinates. */
function temperatureOf(
  used: readonly Name[],
  areas: Readonly<Record<string, number>>,
  unit: AreaUnit,
): number {
  const n = used.length;
  const identity = new Float64Array(n * n);
  for (let i = 0; i < n; i++) identity[i * n + i] = 1;
  const fit = fitStraightLine(
    Float64Array.from(used, (name) => lines[name].upperEnergyEv),
    Float64Array.from(used, (name) => populationOrdinate(lines[name], areas[name]!, unit)),
    identity,
  );
  return -1 / (boltzmannEvPerK * fit!.slope);
}

describe.each(units)('%s areas', (word, unit) => {
  const wrongUnit: AreaUnit = unit === 'energy' ? 'photon' : 'energy';

  test.each([3000, 5000, 8000, 10_000])('at %d K give that temperature', (kelvin) => {
    const areas = checkValue(`boltzmann.ratios_${word}.T${String(kelvin)}`).expected as Record<Name, number>;
    expect(temperatureOf(names, areas, unit) / kelvin).toBeCloseTo(1, 6);
  });

  test.each([3000, 5000, 8000, 10_000])(
    'at %d K read in the other unit mislead by the known amount',
    (kelvin) => {
      const areas = checkValue(`boltzmann.ratios_${word}.T${String(kelvin)}`).expected as Record<
        Name,
        number
      >;
      const mistake = word === 'power' ? 'omitted_for_power' : 'included_for_photon';
      const key = `boltzmann.T_if_lambda_${mistake}_data.T${String(kelvin)}`;
      expectCheckValue(key, temperatureOf(names.slice(0, 4), areas, wrongUnit));
    },
  );

  test('two lines', () => {
    for (const key of checkKeys(new RegExp(`^two_line\\.T\\..*\\.${word}$`))) {
      const [a, b] = /T\.(\w+)\/(\w+)\./.exec(key)!.slice(1) as [Name, Name];
      const found = twoLineTemperature(lines[a], lines[b], numberInput(checkValue(key).inputs, 'R'), unit);
      if (checkValue(key).expected === null) expect(found).toEqual({ kind: 'no-positive-temperature' });
      else expectCheckValue(key, found.kind === 'temperature' ? found.kelvin : NaN);
    }
  });
});

// Limits for T to infinity, g A (energy: over lambda) of alpha over beta, computed independently.
test.each([
  ['energy', 2.182546],
  ['photon', 2.946422],
] as const)('%s: a ratio below its limit has no positive temperature', (unit, limit) => {
  const at = (ratio: number) => twoLineTemperature(lines.Halpha, lines.Hbeta, ratio, unit);
  expect(at(limit * 0.9)).toEqual({ kind: 'no-positive-temperature' });
  expect(at(limit * (1 - 1e-5))).toEqual({ kind: 'no-positive-temperature' });
  const beyond = at(limit * (1 + 1e-5));
  expect(beyond.kind === 'temperature' ? beyond.kelvin : 0).toBeGreaterThan(1e8);
});
