import { describe, expect, test } from 'vitest';
import { equilibrium } from '../../../shared-core/diagnosis/equilibrium.ts';
import { checkOf, runDiagnosis } from '../../support/run-evidence.ts';

const dense = runDiagnosis();
const between = runDiagnosis({ simulation: { electronsPerCubicMetre: 9e19 } });
const thin = runDiagnosis({ simulation: { electronsPerCubicMetre: 1e17 } });

describe('levels in partial equilibrium', () => {
  // H. R. Griem (1963), constant from memory: n = 3 at 10 000 K needs 1.55e20 per m^3, with the root of the temperature.
  test('the needed density is that of the criterion at the measured temperature', () => {
    const { equilibrium: found, temperature } = dense.diagnosis;
    const [first] = found.levels;
    expect(first).toMatchObject({ upperLevel: 3, lineIds: ['H-alpha'] });
    const expected = 1.55e20 * Math.sqrt(temperature.kelvin! / 10_000);
    expect(Math.abs(first!.neededPerCubicMetre! / expected - 1)).toBeLessThan(0.005);
  });

  test('all hold it in a dense plasma', () => {
    expect(dense.diagnosis.equilibrium.lowestEquilibratedLevel).toBe(3);
    expect(new Set(dense.diagnosis.equilibrium.levels.map(({ status }) => status))).toEqual(
      new Set(['equilibrated']),
    );
    expect(checkOf(dense.diagnosis, 'partial-equilibrium')!.verdict).toBe('sound');
  });

  test('one below the rest is named, and asks for care', () => {
    const { levels, lowestEquilibratedLevel } = between.diagnosis.equilibrium;
    expect(lowestEquilibratedLevel).toBe(4);
    expect(levels[0]!.status).not.toBe('equilibrated');
    const check = checkOf(between.diagnosis, 'partial-equilibrium')!;
    expect(check.verdict).toBe('use with care');
    expect(check.facts['levelsBelow']).toBe('H-alpha');
    expect(check.remedy).toContain('analysis.levels');
  });

  test('an upper limit of the density rules levels out and none in', () => {
    const { densityStatus, levels, lowestEquilibratedLevel } = thin.diagnosis.equilibrium;
    expect(densityStatus).toBe('upper-limit');
    expect(lowestEquilibratedLevel).toBeNull();
    expect(levels[0]!.status).toBe('not-equilibrated');
    expect(levels.slice(2).every(({ status }) => status === 'not-known')).toBe(true);
    // No fault of the measurement: the temperature is one of these levels and says so.
    expect(checkOf(thin.diagnosis, 'partial-equilibrium')!.verdict).toBe('sound');
  });

  test('complete equilibrium needs far more than partial', () => {
    // R. W. P. McWhirter (1965), constant from memory: 1.2e23 per m^3 at 5000 K for the 10.2 eV of hydrogen.
    const { neededPerCubicMetre, status } = dense.diagnosis.equilibrium.complete;
    const expected = 1.2002e23 * Math.sqrt(dense.diagnosis.temperature.kelvin! / 5000);
    expect(Math.abs(neededPerCubicMetre! / expected - 1)).toBeLessThan(0.002);
    expect(status).toBe('not-equilibrated');
  });
});

describe('the choice to use equilibrated levels only', () => {
  test('leaves the lower ones out and says so', () => {
    const { diagnosis } = runDiagnosis({
      simulation: { electronsPerCubicMetre: 9e19 },
      options: { levels: 'equilibrated' },
    });
    expect(diagnosis.options.levels).toBe('equilibrated');
    expect(diagnosis.lines[0]).toMatchObject({ id: 'H-alpha', used: false });
    expect(diagnosis.lines[0]!.reasons).toEqual(['below the lowest level in equilibrium with the electrons']);
    expect(diagnosis.temperature.text).toContain('equilibrium with the electrons only');
    expect(diagnosis.notes.join(' ')).toContain('H-alpha left out, as chosen');
    expect(diagnosis.meaning.kind).toBe('electron-temperature');
    expect(between.diagnosis.meaning.kind).toBe('distribution-temperature');
  });

  test('the bench file can make it, and the sheet overrides the bench file', () => {
    const bench = { analysis: { levels: 'equilibrated' } } as const;
    const simulation = { electronsPerCubicMetre: 9e19 };
    expect(runDiagnosis({ simulation, bench }).diagnosis.lines[0]!.used).toBe(false);
    expect(runDiagnosis({ simulation, bench, options: { levels: 'all' } }).diagnosis.lines[0]!.used).toBe(
      true,
    );
  });

  test('does nothing where the density does not say, and says that', () => {
    const { diagnosis } = runDiagnosis({
      simulation: { electronsPerCubicMetre: 1e17 },
      options: { levels: 'equilibrated' },
    });
    expect(diagnosis.lines[0]!.used).toBe(true);
    expect(diagnosis.notes.join(' ')).toContain('the density does not say which hold it');
  });
});

describe('Saha consistency', () => {
  const lamp = { gas: 'H2', pressurePa: 300, gasTemperatureK: 800 };

  test('compares the measured density with equilibrium at the stated pressure', () => {
    const { diagnosis } = runDiagnosis({ bench: { lamp } });
    const { saha } = diagnosis.equilibrium;
    expect(saha.factor).toBeCloseTo(diagnosis.electronDensity.perCubicMetre! / saha.perCubicMetre!, 9);
    expect(saha.lowFactor!).toBeLessThan(saha.factor!);
    expect(saha.highFactor!).toBeGreaterThan(saha.factor!);
    expect(checkOf(diagnosis, 'saha-consistency')).toMatchObject({ verdict: 'sound', remedy: '' });
  });

  test('a density whose own pressure exceeds the stated one asks for care', () => {
    // 3e20 electrons per m^3 at 6300 K and as many ions at 800 K: 29 Pa.
    const { diagnosis } = runDiagnosis({ bench: { lamp: { ...lamp, pressurePa: 10 } } });
    const check = checkOf(diagnosis, 'saha-consistency')!;
    expect(check.verdict).toBe('use with care');
    expect(Number(check.facts['leastPressurePa'])).toBeGreaterThan(15);
    expect(Number(check.facts['leastPressurePa'])).toBeLessThan(35);
  });

  test.each([
    ['without a pressure', {}, 'states no pressure'],
    ['in another gas', { ...lamp, gas: 'Ar' }, 'the gas is Ar'],
  ])('%s there is no sum, and the text says why', (_, given, reason) => {
    const { diagnosis } = runDiagnosis({ bench: { lamp: given } });
    expect(diagnosis.equilibrium.saha.perCubicMetre).toBeNull();
    expect(diagnosis.equilibrium.saha.text).toContain(reason);
    expect(checkOf(diagnosis, 'saha-consistency')).toBeUndefined();
  });
});

test('the highest series member seen bounds the density', () => {
  const { seriesLimit } = dense.diagnosis.equilibrium;
  expect(seriesLimit).toMatchObject({ highestLevel: 7, lineId: 'H-epsilon' });
  // D. R. Inglis, E. Teller (1939), constant from memory: 10^(28.96 - 7.5 log10 7), and the factor of three.
  expect(
    Math.abs(seriesLimit.highPerCubicMetre! / (3 * 10 ** (28.96 - 7.5 * Math.log10(7))) - 1),
  ).toBeLessThan(1e-9);
});

test('without lines there is nothing to say, and nothing is said', () => {
  const { evidence } = runDiagnosis({ simulation: { brightestPixelElectrons: 30 } });
  const found = equilibrium(evidence);
  expect(found.levels.every(({ neededPerCubicMetre }) => neededPerCubicMetre === null)).toBe(true);
  expect(found.complete.neededPerCubicMetre).toBeNull();
  expect(found.seriesLimit.highPerCubicMetre).toBeNull();
});

test('a dense plasma sets the second theory of H-beta beside the measured width', () => {
  const { diagnosis } = runDiagnosis({ simulation: { electronsPerCubicMetre: 3e21 } });
  const check = checkOf(diagnosis, 'density-detectable')!;
  const ratio = Number(check.facts['tabulatedFwhmNm']) / Number(check.facts['starkFwhmNm']);
  // The two theories agree within the seven per cent that the law is given, and ten at 5000 K.
  expect(Math.abs(ratio - 1)).toBeLessThan(0.15);
  expect(check.text).toContain('tabulated theory');
  expect(checkOf(thin.diagnosis, 'density-detectable')!.facts['tabulatedFwhmNm']).toBeNull();
});
