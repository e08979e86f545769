/** Share of a unit-area Voigt profile on one pixel, with its slopes. */
export interface ShareWithSlopes {
  readonly share: number;
  readonly byX: number;
  readonly bySigma: number;
  readonly byGamma: number;
}

/**
 * (1/pi) integral over k of exp(-s^2 k^2/2 - g k) cos(k x) 2 sin(k h/2)/k and its derivatives, by Simpson's rule; shares
 * no code and no method with the program's profile.
 *
 * @param x      pixel centre less line centre, nm
 * @param h      pixel width, nm
 * @param sigma  of the Gauss part, nm
 * @param gamma  half-width of the Lorentz part, nm
 */
export function pixelShare(x: number, h: number, sigma: number, gamma: number): ShareWithSlopes {
  // Where exp(-s^2 k^2/2 - g k) has fallen to 1e-11.
  const last = 50 / (gamma + Math.sqrt(gamma * gamma + 50 * sigma * sigma));
  const count = 2 * Math.max(150, Math.ceil((last * (Math.abs(x) + h)) / 0.6));
  const step = last / count;
  let share = 0;
  let byX = 0;
  let bySigma = 0;
  let byGamma = 0;
  for (let i = 0; i <= count; i++) {
    const k = i * step;
    const weight = i === 0 || i === count ? 1 : i % 2 === 1 ? 4 : 2;
    const pixel = k === 0 ? h : (2 * Math.sin((k * h) / 2)) / k;
    const part = weight * pixel * Math.exp((-sigma * sigma * k * k) / 2 - gamma * k);
    const even = part * Math.cos(k * x);
    share += even;
    byX -= part * k * Math.sin(k * x);
    bySigma -= sigma * k * k * even;
    byGamma -= k * even;
  }
  const scale = step / (3 * Math.PI);
  return { share: share * scale, byX: byX * scale, bySigma: bySigma * scale, byGamma: byGamma * scale };
}

/** Inverse of a symmetric positive definite matrix, by Gauss-Jordan elimination after scaling to a unit diagonal. */
export function invert(matrix: readonly (readonly number[])[]): number[][] {
  const size = matrix.length;
  const scales = matrix.map((row, i) => 1 / Math.sqrt(row[i]!));
  const work = matrix.map((row, i) => [
    ...row.map((value, j) => value * scales[i]! * scales[j]!),
    ...row.map((_, j) => (i === j ? 1 : 0)),
  ]);
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++)
      if (Math.abs(work[row]![column]!) > Math.abs(work[pivot]![column]!)) pivot = row;
    [work[column], work[pivot]] = [work[pivot]!, work[column]!];
    for (let row = 0; row < size; row++) {
      if (row === column) continue;
      const factor = work[row]![column]! / work[column]![column]!;
      for (let j = column; j < 2 * size; j++) work[row]![j]! -= factor * work[column]![j]!;
    }
  }
  return work.map((row, i) =>
    Array.from({ length: size }, (_, j) => (row[size + j]! / row[i]!) * scales[i]! * scales[j]!),
  );
}
