import type { Bench } from '../../../shared-core/bench/bench.ts';
import { formatExact, formatSignificant } from '../../../shared-core/text/format-number.ts';
import {
  bleedDownSeconds,
  bleedTimeAllowance,
  touchLimitVolts,
} from '../../../shared-core/safety/bleed-down.ts';
import { storedEnergyJoules } from '../../../shared-core/safety/stored-energy.ts';

export interface StoredChargeFact {
  readonly name: string;
  readonly value: string;
  readonly remark: string;
}

/** The sums for the supply that the bench file describes; those whose numbers are not stated are left out. */
export function storedChargeFacts(bench: Bench): readonly StoredChargeFact[] {
  const { openCircuitVolts: volts, capacitanceMicrofarads, bleedResistanceMegohms } = bench.supply ?? {};
  if (volts === undefined || capacitanceMicrofarads === undefined) return [];
  const facts: StoredChargeFact[] = [
    {
      name: 'stored energy',
      value: `${formatSignificant(storedEnergyJoules({ capacitanceMicrofarads, volts }), 2)}\u00a0J`,
      remark: 'half the capacitance times the open-circuit voltage squared',
    },
  ];
  if (bleedResistanceMegohms !== undefined) {
    const seconds = bleedDownSeconds({ capacitanceMicrofarads, bleedResistanceMegohms, volts });
    facts.push({
      name: `time to bleed to ${formatExact(touchLimitVolts)}\u00a0V`,
      value: `${formatSignificant(seconds, 2)}\u00a0s`,
      remark: `with ${formatExact(bleedTimeAllowance)} times as an allowance; only as good as the resistor: measure before touching`,
    });
  }
  return facts;
}
