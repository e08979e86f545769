/**
 * How long the charge of a discharge supply takes to leave. An aid to planning only: the sum assumes that capacitance
 * and bleed resistance are as stated and intact, and it never replaces a measurement with a rated probe.
 */
import { log } from '../numeric/portable-math.ts';
import { invariant } from '../result/result.ts';

/**
 * Voltage below which stored charge is commonly treated as touchable in dry conditions, V dc.
 *
 * @source 60 V dc, the figure commonly taken from IEC 61010-1 for accessible parts in normal condition; from
 *         memory, not read in the standard: local rules may ask for less
 */
export const touchLimitVolts = 60;

/**
 * Factor on the bleed time for parts off their nominal values: 1.2 (capacitance) * 1.1 (resistance) = 1.32, rounded up.
 *
 * @source common practice of the trade: tolerances of filter capacitors and high-voltage resistors
 */
export const bleedTimeAllowance = 1.5;

/**
 * Time for the bleed resistor to bring the output down to `touchLimitVolts`, s, with the allowance included.
 *
 * Formula: t = a R C ln(V / V_limit), a = bleedTimeAllowance; 0 when V <= V_limit.
 *
 * @param bleed.capacitanceMicrofarads  uF, >= 0
 * @param bleed.bleedResistanceMegohms  Mohm, > 0 (uF times Mohm is s)
 * @param bleed.volts                   V, >= 0; the open-circuit voltage
 * @returns s, >= 0
 * @source discharge of a capacitor through a resistor, V(t) = V exp(-t / RC)
 * @check  test/unit/safety/stored-energy.test.ts
 */
export function bleedDownSeconds(bleed: {
  readonly capacitanceMicrofarads: number;
  readonly bleedResistanceMegohms: number;
  readonly volts: number;
}): number {
  const { capacitanceMicrofarads, bleedResistanceMegohms, volts } = bleed;
  invariant(capacitanceMicrofarads >= 0 && bleedResistanceMegohms > 0, 'a bleed path has R > 0 and C >= 0');
  invariant(volts >= 0, 'a voltage across a bleed path is stated as its magnitude');
  if (volts <= touchLimitVolts) return 0;
  return bleedTimeAllowance * bleedResistanceMegohms * capacitanceMicrofarads * log(volts / touchLimitVolts);
}
