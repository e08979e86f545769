import { describe, expect, test } from 'vitest';
import { caseB } from '../../../shared-core/physics/case-b.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { runDiagnosis } from '../../support/run-evidence.ts';

/** Population per sublevel that gives the energy ratios of a recombining gas. */
const recombining =
  (ratios: readonly number[]) =>
  (upperLevel: number): number => {
    const line = hydrogenLine(upperLevel);
    const ratio = ratios[upperLevel - 3] ?? 0;
    return (ratio * line.wavelengthVacuumNm) / (line.upperWeight * line.transitionProbabilityPerS);
  };
const reminder = 'A straight plot alone proves nothing';

describe('what the temperature may be read as', () => {
  test('the electrons at a density that holds all levels in use, and then no reminder', () => {
    const { meaning } = runDiagnosis().diagnosis;
    expect(meaning).toMatchObject({ kind: 'electron-temperature', lowestEquilibratedLevel: 3 });
    expect(meaning.text).not.toContain(reminder);
  });

  test('else the populations, with the reminder', () => {
    for (const electronsPerCubicMetre of [1e17, 9e19]) {
      const { meaning } = runDiagnosis({ simulation: { electronsPerCubicMetre } }).diagnosis;
      expect(meaning.kind).toBe('distribution-temperature');
      expect(meaning.text).toContain(reminder);
    }
  });

  test('a bent plot is no electron temperature at any density', () => {
    const { meaning } = runDiagnosis({
      simulation: {
        populationOf: (level) => {
          const energy = hydrogenLine(level).upperEnergyEv - hydrogenLine(3).upperEnergyEv;
          return (
            0.9 * Math.exp(-energy / (8.617333e-5 * 3000)) + 0.1 * Math.exp(-energy / (8.617333e-5 * 12_000))
          );
        },
      },
    }).diagnosis;
    expect(meaning.kind).toBe('distribution-temperature');
    expect(meaning.lowestEquilibratedLevel).toBe(3);
    expect(meaning.text).toContain('bends up at its ends');
    expect(meaning.text).toContain('two groups of electrons');
  });

  test('a recombining gas is recognised by its line ratios', () => {
    const gas = caseB.find(
      ({ kelvin, electronsPerCubicMetre }) => kelvin === 10_000 && electronsPerCubicMetre === 1e14,
    )!;
    const { meaning } = runDiagnosis({
      simulation: { electronsPerCubicMetre: 1e14, populationOf: recombining(gas.ratios) },
    }).diagnosis;
    expect(meaning.kind).toBe('distribution-temperature');
    expect(meaning.text).toContain('recombining gas of 10000 K (case B)');
  });
});
