import { exp, log } from '../numeric/portable-math.ts';

/**
 * Reduced half width of H-beta, angstrom per (2.61 e N^2/3): rows by temperature, columns by electron density. The
 * theory is another than that of the law in stark.ts (quasi-static ions), so that the two tell how sure a width is.
 */
const kelvins = [5000, 10_000, 20_000, 30_000];
const log10PerCubicMetre = [21, 22, 23, 24];
const reducedHalfWidth: readonly (readonly number[])[] = [
  [0.0787, 0.0808, 0.0765],
  [0.0803, 0.084, 0.0851, 0.0781],
  [0.0815, 0.086, 0.0902, 0.0896],
  [0.0814, 0.086, 0.0919, 0.0946],
];
const inverseLn10 = 0.4342944819032518;
const ln10 = 2.302585092994046;

/**
 * Stark FWHM of H-beta, nm, by the tabulated theory: 2.50e-10 alpha N^(2/3), N per cm^3 inside the formula, alpha by
 * straight interpolation in log N and log T.
 *
 * @returns null outside the table: 5000 to 30 000 K, 1e21 to 1e24 m^-3 (1e23 below 10 000 K)
 * @source alpha: [Martin2002] sec. 20, after the profiles of [Griem1974]; prefactor from memory
 * @check  test/reference/stark.test.ts
 */
export function hBetaTabulatedFwhmNm(perCubicMetre: number, kelvin: number): number | null {
  const row = cell(kelvins.map(log), log(kelvin));
  const column = cell(log10PerCubicMetre, inverseLn10 * log(perCubicMetre));
  if (row === null || column === null) return null;
  const at = (i: number, j: number): number | undefined => reducedHalfWidth[i]![j];
  const along = (i: number): number | null => {
    const low = at(i, column.index);
    const high = column.share > 0 ? at(i, column.index + 1) : low;
    return low === undefined || high === undefined ? null : low + column.share * (high - low);
  };
  const cool = along(row.index);
  const hot = row.share > 0 ? along(row.index + 1) : cool;
  if (cool === null || hot === null) return null;
  const alpha = cool + row.share * (hot - cool);
  return 2.5e-10 * alpha * exp((2 / 3) * (log(perCubicMetre) - 6 * ln10));
}

/** The interval of a rising grid that holds a value, and how far along it; a hair beyond the ends counts as the end. */
function cell(
  grid: readonly number[],
  value: number,
): { readonly index: number; readonly share: number } | null {
  const last = grid.length - 1;
  const slack = 1e-9 * (grid[last]! - grid[0]!);
  if (value < grid[0]! - slack || value > grid[last]! + slack) return null;
  let index = 0;
  while (index < last - 1 && grid[index + 1]! <= value + slack) index++;
  if (Math.abs(value - grid[last]!) <= slack) return { index: last, share: 0 };
  const share = (value - grid[index]!) / (grid[index + 1]! - grid[index]!);
  return { index, share: Math.abs(share) < 1e-9 ? 0 : share };
}
