import { pixelAt } from '../axis/pixel-at.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import { lorentzianBeforehandNm, thermalFwhmSquaredNm2 } from '../physics/line-widths.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import { starkWidthOfLine } from '../physics/stark.ts';
import { absorbingProfile, type AbsorbingAtoms } from './absorbing-profile.ts';
import { lineWindow, type LineWindow } from './line-window.ts';
import { slab, type Slab } from './slab.ts';

/** Where a line stands in the recordings. */
export interface LinePlace {
  readonly line: HydrogenLine;
  /** nm, recorded axis. */
  readonly centreNm: number;
  /** As recorded, pixel included. */
  readonly fwhmNm: number;
  /** nm; how far the deuterium line lies off, where there is one: it belongs to the core. */
  readonly isotopeShiftNm: number;
  /** Why the light there is not the line's alone; null when it is. */
  readonly blendedWith: string | null;
}

/** The gas, and how far its shape is known: each other entry is one standard uncertainty away, one cause each. */
export interface GasShapes {
  readonly best: AbsorbingAtoms;
  readonly others: readonly { readonly low: AbsorbingAtoms; readonly high: AbsorbingAtoms }[];
}

/** A line in a window, with what the gas does to it for the best shape and for each other. */
export interface ObservedLine {
  readonly place: LinePlace;
  readonly window: LineWindow;
  readonly isResolved: boolean;
  readonly best: Slab;
  readonly others: readonly { readonly low: Slab; readonly high: Slab }[];
}

/** All that the pixels say besides their signal. */
export interface Surroundings {
  readonly recording: CorrectedRecording;
  /** Pixels that are clipped in one of the recordings. */
  readonly clipped: Uint8Array;
  /** Light that belongs to no line of hydrogen, nm, recorded axis. */
  readonly foreignNm: readonly number[];
  /** Every hydrogen line, nm, recorded axis. */
  readonly hydrogenNm: readonly number[];
  readonly instrumentFwhmNm: number;
}

/** Core and sides of a window in recorded widths. */
const sizes = Object.freeze({ core: 1.5, resolvedCore: 0.15, sideFrom: 2, reach: 6, mask: 1.5 });
/** The atoms' own width over the instrument's from which single pixels show the depth of the gas, to 5 %. */
const resolvedWidths = 3;
/** Squared pixel widths that a pixel adds to a squared FWHM: 8 ln 2 / 12. */
const pixelSpread = 0.4621;

/** A line ready to be measured, or why it cannot be, in one clause. */
export function observeLine(place: LinePlace, around: Surroundings, gas: GasShapes): ObservedLine | string {
  const { recording, clipped } = around;
  const { centreNm, fwhmNm, isotopeShiftNm } = place;
  const { wavelengthNm, edgeNm } = recording;
  const coreHalfNm = sizes.core * fwhmNm + isotopeShiftNm;
  const centrePx = pixelAt(wavelengthNm, centreNm);
  if (centreNm - coreHalfNm < wavelengthNm[0]! || centreNm + coreHalfNm > wavelengthNm.at(-1)!)
    return 'outside the recorded range';
  const inCore = (nm: number): boolean => Math.abs(nm - centreNm) < coreHalfNm;
  const isOwn = (nm: number): boolean => Math.abs(nm - centreNm) < 0.5 * fwhmNm + isotopeShiftNm;
  const from = pixelAt(wavelengthNm, centreNm - coreHalfNm);
  const to = pixelAt(wavelengthNm, centreNm + coreHalfNm);
  for (let px = from; px <= to; px++) if (clipped[px] === 1) return 'clipped in one of the recordings';
  if (place.blendedWith !== null) return place.blendedWith;
  const others = [...around.foreignNm, ...around.hydrogenNm].filter((nm) => !isOwn(nm));
  const inside = others.find(inCore);
  if (inside !== undefined) return `other light lies under it, at ${inside.toFixed(2)} nm`;
  const masked = clipped.slice();
  for (const nm of others) {
    if (Math.abs(nm - centreNm) > (sizes.reach + sizes.mask) * fwhmNm + isotopeShiftNm) continue;
    const last = pixelAt(wavelengthNm, nm + sizes.mask * fwhmNm);
    for (let px = pixelAt(wavelengthNm, nm - sizes.mask * fwhmNm); px <= last; px++)
      if (!inCore(wavelengthNm[px]!)) masked[px] = 1;
  }
  const pixelNm = edgeNm[centrePx + 1]! - edgeNm[centrePx]!;
  const instrument = around.instrumentFwhmNm;
  const instrumentNm = Math.sqrt(instrument * instrument + pixelSpread * pixelNm * pixelNm);
  const isResolved = isotopeShiftNm === 0 && ownFwhmNm(place.line, gas.best) > resolvedWidths * instrumentNm;
  const window = lineWindow(wavelengthNm, masked, centreNm, {
    coreHalfNm: isResolved ? sizes.resolvedCore * fwhmNm : coreHalfNm,
    sideFromNm: sizes.sideFrom * fwhmNm + isotopeShiftNm,
    reachNm: sizes.reach * fwhmNm + isotopeShiftNm,
  });
  if (window === null) return 'no free pixels beside it for its baseline';
  const through = (atoms: AbsorbingAtoms): Slab =>
    slab(absorbingProfile(place.line, atoms), window, edgeNm, centreNm, instrument);
  return {
    place,
    window,
    isResolved,
    best: through(gas.best),
    others: gas.others.map(({ low, high }) => ({ low: through(low), high: through(high) })),
  };
}

/** FWHM of the atoms' own profile, nm. */
function ownFwhmNm(line: HydrogenLine, { lamp, electronsPerCubicMetre }: AbsorbingAtoms): number {
  const stark = electronsPerCubicMetre > 0 ? starkWidthOfLine(line.upperLevel, electronsPerCubicMetre) : 0;
  return voigtFwhmNm(
    Math.sqrt(thermalFwhmSquaredNm2(line, lamp)),
    lorentzianBeforehandNm(line, lamp) + stark,
  );
}
