import { exp } from '../numeric/portable-math.ts';
import { airRefractivityCiddor } from './air-index.ts';

/** State of the air in a laboratory. */
export interface LaboratoryAir {
  /** -40 to 100. */
  readonly celsius: number;
  /** 80 000 to 120 000 for the stated accuracy. */
  readonly pressurePa: number;
  /** 0 to 1; default dry. */
  readonly relativeHumidity?: number;
  /** Mole fraction in ppm, 0 to 2000; default 450. */
  readonly carbonDioxidePpm?: number;
}

/** J/(mol K), the value the equations were fitted with. */
const gasConstant = 8.31451;
const waterMolarMassKg = 0.018015;

/**
 * n - 1 of moist air by Ciddor's equations: densities of dry air and water vapour from the compressibility of their
 * mixture, each times its refractivity at a standard state (15 C, 101 325 Pa, dry; 20 C, 1333 Pa of pure vapour).
 *
 * Uncertainty 2 to 5e-8 for ordinary laboratory air, 300 to 1700 nm: temperature (1e-6 per K) and pressure decide before it.
 *
 * @param wavelengthVacuumNm  300 to 1700
 * @source [Ciddor1996] appendices A to C; coefficients from memory, reproduced against published values
 * @check  test/reference/air-index.test.ts
 */
export function moistAirRefractivity(wavelengthVacuumNm: number, air: LaboratoryAir): number {
  const { celsius, pressurePa } = air;
  const kelvin = celsius + 273.15;
  const carbonDioxidePpm = air.carbonDioxidePpm ?? 450;
  const waterFraction = waterMoleFraction(air);
  const s2 = 1e6 / (wavelengthVacuumNm * wavelengthVacuumNm);
  const dry = airRefractivityCiddor(wavelengthVacuumNm) * (1 + 0.534e-6 * (carbonDioxidePpm - 450));
  const vapour = 1.022e-8 * (295.235 + s2 * (2.6422 + s2 * (-0.03238 + s2 * 0.004028)));
  const dryMolarMassKg = 1e-3 * (28.9635 + 12.011e-6 * (carbonDioxidePpm - 400));
  const perMole = pressurePa / (compressibility(kelvin, pressurePa, waterFraction) * gasConstant * kelvin);
  const standardDry =
    (101_325 * dryMolarMassKg) / (compressibility(288.15, 101_325, 0) * gasConstant * 288.15);
  const standardVapour =
    (1333 * waterMolarMassKg) / (compressibility(293.15, 1333, 1) * gasConstant * 293.15);
  return (
    ((perMole * dryMolarMassKg * (1 - waterFraction)) / standardDry) * dry +
    ((perMole * waterMolarMassKg * waterFraction) / standardVapour) * vapour
  );
}

/** Mole fraction of water: enhancement x humidity x saturation pressure over the pressure. */
function waterMoleFraction({ celsius, pressurePa, relativeHumidity = 0 }: LaboratoryAir): number {
  const kelvin = celsius + 273.15;
  const saturationPa = exp(
    1.2378847e-5 * kelvin * kelvin - 1.9121316e-2 * kelvin + 33.93711047 - 6.3431645e3 / kelvin,
  );
  const enhancement = 1.00062 + 3.14e-8 * pressurePa + 5.6e-7 * celsius * celsius;
  return (enhancement * relativeHumidity * saturationPa) / pressurePa;
}

function compressibility(kelvin: number, pressurePa: number, water: number): number {
  const t = kelvin - 273.15;
  const ratio = pressurePa / kelvin;
  const second =
    1.58123e-6 +
    t * (-2.9331e-8 + t * 1.1043e-10) +
    (5.707e-6 - 2.051e-8 * t) * water +
    (1.9898e-4 - 2.376e-6 * t) * water * water;
  return 1 - ratio * second + ratio * ratio * (1.83e-11 - 0.765e-8 * water * water);
}
