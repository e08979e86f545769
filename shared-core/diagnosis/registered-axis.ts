import { toRegisteredNm } from '../axis/axis-polynomial.ts';
import type { AxisRegistration, RecordedAxisMap } from '../axis/register-axis.ts';
import type { LineFits } from '../lines/line-fit.ts';

/** The registration refined by the line fit. */
export function finalAxisMap(
  { map }: AxisRegistration,
  { axisShift }: Pick<LineFits, 'axisShift'>,
): RecordedAxisMap {
  return { ...map, offsetNm: map.offsetNm + axisShift.offsetNm, stretch: map.stretch + axisShift.stretch };
}

export interface RegisteredAxis {
  /** registered = recorded + offsetNm + stretch (recorded - pivotNm), to first order about the pivot. */
  readonly offsetNm: number;
  readonly offsetSigmaNm: number;
  readonly stretch: number;
  readonly stretchSigma: number;
}

/** The same correction the way a person reads it: from the recorded axis to the true one. */
export function registeredAxis(registration: AxisRegistration, fits: LineFits): RegisteredAxis {
  const map = finalAxisMap(registration, fits);
  const pivot = map.pivotNm;
  const stepNm = 50;
  const at = (nm: number): number => toRegisteredNm(map, nm) - nm;
  return {
    offsetNm: at(pivot),
    offsetSigmaNm: fits.axisShift.offsetSigmaNm,
    stretch: (at(pivot + stepNm) - at(pivot - stepNm)) / (2 * stepNm),
    stretchSigma: fits.axisShift.stretchSigma,
  };
}
