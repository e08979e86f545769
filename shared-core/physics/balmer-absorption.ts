import { curveOfGrowth, type CurveOfGrowth } from './curve-of-growth.ts';
import { oscillatorStrength, type HydrogenLine } from './hydrogen.ts';
import { lorentzianBeforehandNm, thermalFwhmSquaredNm2, type LampConditions } from './line-widths.ts';
import { starkWidthOfLine } from './stark.ts';

/** How each line answers to the optical depth of H-alpha. */
export interface LineAbsorption {
  readonly curve: CurveOfGrowth;
  /** Optical depth at this line's centre over that of H-alpha. */
  readonly relativeDepth: number;
}

/**
 * Curves of growth of Balmer lines: the atoms' own shape (Doppler with fine structure, Stark and pressure widths), for
 * the instrument spreads light that is already lost. Depths at the centre go with f lambda^2 x peak of the profile:
 * f lambda where Doppler broadening rules.
 *
 * @param lamp                   gas temperature and pressure
 * @param electronsPerCubicMetre 0 where the Stark width is not seen
 * @source [Mitchell1934] ch. 3
 * @check  test/unit/populations/optical-depth.test.ts
 */
export function balmerAbsorption(
  lines: readonly HydrogenLine[],
  lamp: LampConditions,
  electronsPerCubicMetre: number,
  alpha: HydrogenLine,
): readonly LineAbsorption[] {
  const absorb = (line: HydrogenLine): { curve: CurveOfGrowth; strength: number } => {
    const curve = curveOfGrowth(
      Math.sqrt(thermalFwhmSquaredNm2(line, lamp)),
      lorentzianBeforehandNm(line, lamp) +
        (electronsPerCubicMetre > 0 ? starkWidthOfLine(line.upperLevel, electronsPerCubicMetre) : 0),
    );
    const nm = line.wavelengthVacuumNm;
    return { curve, strength: oscillatorStrength(line.lowerLevel, line.upperLevel) * nm * nm * curve.peak };
  };
  const reference = absorb(alpha).strength;
  return lines.map((line) => {
    const { curve, strength } = absorb(line);
    // Lines that end on another level are absorbed by other atoms, of which nothing is known here.
    return { curve, relativeDepth: line.lowerLevel === alpha.lowerLevel ? strength / reference : 0 };
  });
}
