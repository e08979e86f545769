import type { Bench } from '../bench/bench.ts';
import { formatExact, formatSignificant } from '../text/format-number.ts';
import { storedEnergyJoules } from './stored-energy.ts';

export type Hazard =
  'high voltage' | 'ultraviolet' | 'hydrogen' | 'hot glass' | 'implosion' | 'mercury' | 'x-rays';

/** One thing to know before switching on, in this program's own words. */
export interface Caution {
  /** Stable, kebab-case. */
  readonly id: string;
  readonly hazard: Hazard;
  readonly text: string;
  /** What in the bench description calls for it, or that the description leaves it open. */
  readonly appliesBecause: string;
}

/** The standing sentence of every screen and report. */
export const notASafetyDevice =
  'This program is not a safety device: it replaces no interlock, no risk assessment and no qualified person. ' +
  'Local codes, the instructions of the makers and licensed practice come first.';

/** Below this supply voltage the high-voltage cautions are left out, V; see touchLimitVolts for the figure. */
const lowVoltageVolts = 60;
/** From here on X-rays are worth a survey, V. @source common practice of the trade: about 5 kV in glass */
const xRayVolts = 5000;
/** Above this pressure electrons lose their energy in the gas, Pa. @source own conservative choice */
const xRayPressurePa = 10_000;

/**
 * The cautions for a bench, worst hazard first. What the bench description leaves open counts as present.
 *
 * @source advisory practice of the trade, from memory; not a risk assessment (standards: safety/references.ts)
 * @check  test/unit/safety/cautions.test.ts
 */
export function cautionsFor(bench: Bench): readonly Caution[] {
  return [
    ...highVoltage(bench),
    ...xRays(bench),
    ...hydrogen(bench),
    ...mercury(bench),
    ...ultraviolet(),
    ...glass(bench),
  ];
}

function highVoltage(bench: Bench): Caution[] {
  const supply = bench.supply ?? {};
  const { openCircuitVolts: volts, capacitanceMicrofarads } = supply;
  if (volts !== undefined && volts <= lowVoltageVolts) return [];
  const because =
    volts === undefined ? 'the supply voltage is not stated' : `${voltsText(volts)} open circuit`;
  const caution = (id: string, text: string, appliesBecause = because): Caution => ({
    id,
    hazard: 'high voltage',
    text,
    appliesBecause,
  });
  return [
    caution(
      'voltage-lethal',
      'The supply can kill. The full open-circuit voltage stands on the electrodes until the tube strikes, and again whenever it goes out; keep the current limit in place.',
    ),
    caution(
      'voltage-stored-charge',
      'Charge stays in filter and doubler capacitors after switch-off. Unplug, wait for the bleed resistor, check with a probe rated for the voltage, then short with an insulated earthing stick before touching.',
      chargeReason(volts, capacitanceMicrofarads) ?? because,
    ),
    caution(
      'voltage-bleed',
      'Rely on no bleed resistor that has not been measured: an open one leaves the capacitor charged and gives no sign.',
      supply.bleedResistanceMegohms === undefined
        ? 'no bleed resistance is stated'
        : `a bleed resistor of ${formatExact(supply.bleedResistanceMegohms)} MΩ is stated`,
    ),
    caution(
      'voltage-one-hand',
      'Where live work cannot be avoided at all: qualified people only, one hand, dry floor, never alone, and somebody who knows the emergency switch.',
    ),
    caution(
      'voltage-shield',
      'Cover the electrodes with an interlocked shield. Never defeat the interlock, and change tubes only with the supply unplugged.',
    ),
    caution(
      'voltage-earth',
      'Bond all metal to protective earth. A residual-current breaker does not protect on an isolated secondary; couple the spectrometer by fibre so that no fault reaches the computer.',
    ),
  ];
}

function chargeReason(volts: number | undefined, capacitanceMicrofarads: number | undefined): string | null {
  if (volts === undefined || capacitanceMicrofarads === undefined || capacitanceMicrofarads === 0)
    return null;
  const joules = storedEnergyJoules({ capacitanceMicrofarads, volts });
  return `${formatExact(capacitanceMicrofarads)} µF at ${voltsText(volts)} hold ${formatSignificant(joules, 2)} J`;
}

function xRays(bench: Bench): Caution[] {
  const volts = bench.supply?.openCircuitVolts;
  const pressurePa = bench.lamp?.pressurePa;
  if (volts !== undefined && volts < xRayVolts) return [];
  if (pressurePa !== undefined && pressurePa > xRayPressurePa) return [];
  const voltage =
    volts === undefined ? 'a supply voltage that is not stated' : `${voltsText(volts)} open circuit`;
  const pressure =
    pressurePa === undefined ? 'a pressure that is not stated' : `${pascalText(pressurePa)} gas`;
  return [
    {
      id: 'x-rays-low-pressure',
      hazard: 'x-rays',
      text: 'Above about 5 kV a tube at low pressure can give X-rays, more so as it ages and its gas is used up. Have it surveyed by whoever answers for radiation protection.',
      appliesBecause: `${voltage} on ${pressure}`,
    },
  ];
}

function hydrogen(bench: Bench): Caution[] {
  const gas = bench.lamp?.gas;
  if (gas !== undefined && !/\b(h|d|h2|d2|hd|h2o|d2o)\b|hydrogen|deuterium|forming gas|water/i.test(gas))
    return [];
  const appliesBecause = gas === undefined ? 'the gas is not stated' : `the gas is ${gas}`;
  return [
    {
      id: 'hydrogen-flammable',
      hazard: 'hydrogen',
      text: 'Hydrogen burns in air from 4 to 75 vol %, with a flame that can hardly be seen, and a spark far too weak to feel lights it. A sealed tube holds little; a bottle and a flow line hold enough.',
      appliesBecause,
    },
    {
      id: 'hydrogen-handling',
      hazard: 'hydrogen',
      text: 'Where gas flows: leak-test, vent upwards, let none collect under a ceiling or hood, fit a flashback arrestor, and purge with inert gas before the supply goes on.',
      appliesBecause,
    },
  ];
}

function mercury(bench: Bench): Caution[] {
  const gas = bench.lamp?.gas;
  if (gas === undefined || !/\bhg\b|mercury/i.test(gas)) return [];
  return [
    {
      id: 'mercury-breakage',
      hazard: 'mercury',
      text: 'A broken mercury lamp gives off poisonous vapour: leave, ventilate, use a spill kit, never a vacuum cleaner, and dispose of it as local rules say.',
      appliesBecause: `the gas is ${gas}`,
    },
  ];
}

function ultraviolet(): Caution[] {
  const appliesBecause = 'a discharge in hydrogen or mercury gives ultraviolet; the window is not stated';
  return [
    {
      id: 'ultraviolet-eyes-skin',
      hazard: 'ultraviolet',
      text: 'Ultraviolet hurts eyes and skin without being felt at the time. Quartz windows let it out (mercury above all at 253.7 nm); ordinary glass stops most of it. Shield the lamp, wear rated eye protection.',
      appliesBecause,
    },
    {
      id: 'ultraviolet-ozone',
      hazard: 'ultraviolet',
      text: 'Below about 240 nm the light makes ozone from air: ventilate, and leave when there is a sharp smell.',
      appliesBecause,
    },
  ];
}

function glass(bench: Bench): Caution[] {
  const pressurePa = bench.lamp?.pressurePa;
  const cautions: Caution[] = [
    {
      id: 'hot-glass',
      hazard: 'hot glass',
      text: 'The ends of a running tube are well above 100 °C and look the same when hot. Let it cool before touching, and keep to its rated duty cycle.',
      appliesBecause: 'every discharge tube warms its electrodes',
    },
  ];
  // Atmospheric sources have no evacuated envelope; everything else that is not stated counts as one.
  if (pressurePa !== undefined && pressurePa >= 90_000) return cautions;
  cautions.push({
    id: 'implosion',
    hazard: 'implosion',
    text: 'Evacuated glass can implode: wear goggles, handle tubes in their holder, discard scratched or chipped ones.',
    appliesBecause:
      pressurePa === undefined
        ? 'the filling pressure is not stated'
        : `the tube is filled to ${pascalText(pressurePa)}, far below the air around it`,
  });
  return cautions;
}

function voltsText(volts: number): string {
  return volts >= 1000 ? `${formatExact(volts / 1000)} kV` : `${formatExact(volts)} V`;
}

function pascalText(pascal: number): string {
  return `${formatExact(pascal)} Pa`;
}
