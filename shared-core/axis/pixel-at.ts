/** Index of the pixel whose centre is nearest to `nm`, by bisection. */
export function pixelAt(wavelengthNm: Float64Array, nm: number): number {
  let low = 0;
  let high = wavelengthNm.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (wavelengthNm[middle]! <= nm) low = middle;
    else high = middle;
  }
  return nm - wavelengthNm[low]! <= wavelengthNm[high]! - nm ? low : high;
}
