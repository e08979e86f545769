/**
 * Energy in the capacitors of a discharge supply. An aid to planning only: the sum assumes that the capacitance is as
 * stated, and it never replaces a measurement with a rated probe.
 */
import { invariant } from '../result/result.ts';

/**
 * Energy held by a charged capacitor, J.
 *
 * Formula: W = C V^2 / 2
 *
 * @param charge.capacitanceMicrofarads  uF, >= 0; everything on the output: filter, cable, tube
 * @param charge.volts                   V, >= 0; the open-circuit voltage, since an unlit tube lets the output rise to it
 * @returns J
 * @source definition of capacitance; any text on electrostatics
 * @check  test/unit/safety/stored-energy.test.ts
 */
export function storedEnergyJoules(charge: {
  readonly capacitanceMicrofarads: number;
  readonly volts: number;
}): number {
  const { capacitanceMicrofarads, volts } = charge;
  invariant(capacitanceMicrofarads >= 0 && volts >= 0, 'capacitance and voltage are not negative');
  return 0.5 * capacitanceMicrofarads * 1e-6 * volts * volts;
}
