/** A number with blanks between its thousands: "6 210". */
export function groupThousands(value: number): string {
  const [whole = '', fraction] = String(Math.abs(value)).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ' ');
  return `${value < 0 ? '-' : ''}${grouped}${fraction === undefined ? '' : `.${fraction}`}`;
}

/** Kelvin, rounded to the second digit of its uncertainty; without one, to three digits. */
export function kelvinText(kelvin: number, sigmaKelvin: number | null): string {
  const step = roundingStep(sigmaKelvin !== null && sigmaKelvin > 0 ? sigmaKelvin : kelvin / 10);
  return groupThousands(Math.round(kelvin / step) * step);
}

/** The power of ten, at least 1, that leaves two digits of `size`. */
function roundingStep(size: number): number {
  let step = 1;
  while (size / step >= 99.5) step *= 10;
  return step;
}

/** "4.1e20": two digits, as densities are not known better. */
export const densityText = (perCubicMetre: number): string =>
  perCubicMetre.toExponential(1).replace('e+', 'e');

export const signalText = (value: number): string => value.toPrecision(4);
