import { describe, expect, it } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { cautionsFor, notASafetyDevice } from '../../../shared-core/safety/cautions.ts';
import { safetyReferences } from '../../../shared-core/safety/references.ts';

const demo: Bench = {
  name: 'Bench 3',
  lamp: { id: 'T-07', gas: 'H2', pressurePa: 300 },
  supply: {
    openCircuitVolts: 5000,
    currentMilliamps: 10,
    capacitanceMicrofarads: 0.02,
    bleedResistanceMegohms: 10,
  },
};
const hazards = (bench: Bench) => new Set(cautionsFor(bench).map((caution) => caution.hazard));
const reasons = (bench: Bench) =>
  cautionsFor(bench)
    .map((caution) => caution.appliesBecause)
    .join('\n');

describe('cautionsFor', () => {
  it('counts as present what the bench leaves open', () => {
    expect([...hazards({})].sort()).toEqual([
      'high voltage',
      'hot glass',
      'hydrogen',
      'implosion',
      'ultraviolet',
      'x-rays',
    ]);
    expect(reasons({})).toContain('not stated');
  });

  it('says the stored energy of the supply: 0.02 uF at 5 kV hold 0.25 J', () => {
    expect(reasons(demo)).toContain('0.02 µF at 5 kV hold 0.25 J');
  });

  it('covers each point asked of a high-voltage bench', () => {
    const text = cautionsFor(demo)
      .map((caution) => caution.text)
      .join(' ');
    for (const point of [
      'open-circuit',
      'bleed resistor',
      'probe rated',
      'one hand',
      'never alone',
      'interlocked shield',
      'protective earth',
      '253.7 nm',
      'Quartz',
      'ozone',
      '4 to 75 vol %',
      'goggles',
      'X-rays',
    ])
      expect(text, point).toContain(point);
  });

  it('drops high voltage and X-rays only where the voltage is stated and low', () => {
    const low = { ...demo, supply: { openCircuitVolts: 48 } };
    expect(hazards(low)).not.toContain('high voltage');
    expect(hazards(low)).not.toContain('x-rays');
    expect(hazards({ ...demo, supply: {} })).toContain('high voltage');
  });

  it('warns of X-rays from 5 kV at low pressure, not at 4.9 kV, not near atmospheric pressure', () => {
    expect(hazards(demo)).toContain('x-rays');
    expect(hazards({ ...demo, supply: { openCircuitVolts: 4900 } })).not.toContain('x-rays');
    expect(hazards({ ...demo, lamp: { ...demo.lamp, pressurePa: 100_000 } })).not.toContain('x-rays');
  });

  it.each(['H2', 'D2', 'Ar + 1 % H2', 'hydrogen', 'Ar/H2O'])('warns of hydrogen in %s', (gas) => {
    expect(hazards({ lamp: { gas } })).toContain('hydrogen');
  });

  it('leaves hydrogen out for helium, and mercury out unless it is there', () => {
    expect(hazards({ lamp: { gas: 'He' } })).not.toContain('hydrogen');
    expect(hazards(demo)).not.toContain('mercury');
    expect(hazards({ lamp: { gas: 'Ar + Hg' } })).toContain('mercury');
  });

  it('leaves implosion out for a source at atmospheric pressure', () => {
    expect(hazards({ lamp: { gas: 'Ar + H2', pressurePa: 101_325 } })).not.toContain('implosion');
  });

  it('gives every caution its own id and a short text', () => {
    const cautions = cautionsFor({ lamp: { gas: 'H2 + Hg' } });
    expect(new Set(cautions.map((caution) => caution.id)).size).toBe(cautions.length);
    for (const caution of cautions) {
      expect(caution.text.length, caution.id).toBeLessThan(260);
      expect(caution.text.length, caution.id).toBeGreaterThan(40);
    }
  });
});

describe('what stands beside the cautions', () => {
  it('defers to local codes and licensed practice', () => {
    expect(notASafetyDevice).toContain('not a safety device');
    expect(notASafetyDevice).toContain('Local codes');
    expect(notASafetyDevice).toContain('licensed practice');
  });

  it('names each standard once, with what it covers', () => {
    const names = safetyReferences.map((reference) => reference.name);
    expect(new Set(names).size).toBe(names.length);
    expect(names).toContain('IEC 61010-1');
    for (const { name, covers } of safetyReferences) expect(covers.length, name).toBeGreaterThan(10);
  });
});
