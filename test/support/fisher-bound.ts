/**
 * Cramer-Rao bound of the temperature, by a numerical Fisher matrix that shares no code with the program.
 *
 * The pixel-integrated Voigt profile comes from its Fourier integral (characteristic function exp(-s^2 k^2/2 - g|k|)
 * times the pixel's), derivatives from central differences, level energies and transition probabilities from
 * published tables: A. Kramida, At. Data Nucl. Data Tables 96, 586 (2010); W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref.
 * Data 38, 565 (2009); wavelengths J. Reader, Appl. Spectrosc. 58, 1469 (2004).
 */
interface TabulatedLine {
  readonly nm: number;
  readonly energyEv: number;
  readonly weightTimesA: number;
  /** Lorentz width relative to H-beta's. */
  readonly starkRatio: number;
}

const lines: readonly TabulatedLine[] = [
  { nm: 656.2795, energyEv: 12.08750516, weightTimesA: 18 * 4.4101e7, starkRatio: 0.229 },
  { nm: 486.1325, energyEv: 12.74853932, weightTimesA: 32 * 8.4193e6, starkRatio: 1 },
  { nm: 434.0463, energyEv: 13.05450169, weightTimesA: 50 * 2.5304e6, starkRatio: 1.25 },
  { nm: 410.1735, energyEv: 13.22070389, weightTimesA: 72 * 9.732e5, starkRatio: 2.1 },
  { nm: 397.0072, energyEv: 13.32091817, weightTimesA: 98 * 4.3889e5, starkRatio: 2.22 },
];
const boltzmannEvPerK = 8.617333262e-5;

export interface FisherInput {
  readonly kelvin: number;
  readonly brightestPixelElectrons: number;
  readonly continuumElectrons: number;
  readonly starkFwhmNm: number;
  readonly fwhmNm: number;
  readonly fwhmSigmaNm: number;
  readonly readNoiseElectrons: number;
  readonly gainElectronsPerCount: number;
  readonly pixelNm: number;
  readonly firstNm: number;
  /** Half of the stretch of pixels about each line that is taken to inform, nm. */
  readonly halfWindowNm: number;
}

/** Smallest standard deviation, K, that an unbiased estimate of the temperature can have. */
export function temperatureBoundK(input: FisherInput): number {
  const pixels = lines.map(({ nm }) => pixelsAbout(input, nm));
  // T, ln(scale), axis offset, stretch, instrument width, Stark width, then two baseline terms a line.
  const scale = brightestScale(input, pixels);
  const start = [input.kelvin, 0, 0, 0, input.fwhmNm, input.starkFwhmNm, ...lines.flatMap(() => [0, 0])];
  const steps = [input.kelvin * 1e-4, 1e-4, 1e-4, 1e-6, 1e-4, 1e-4, ...lines.flatMap(() => [1, 1])];
  const expected = model(input, pixels, scale, start);
  const slopes = start.map((value, index) => {
    const moved = (by: number): number[] => model(input, pixels, scale, start.with(index, value + by));
    const up = moved(steps[index]!);
    const down = moved(-steps[index]!);
    return up.map((high, px) => (high - down[px]!) / (2 * steps[index]!));
  });
  const size = start.length;
  const fisher = Array.from({ length: size }, (_, i) =>
    Array.from({ length: size }, (_unused, j) =>
      expected.reduce((sum, mean, px) => {
        const variance = mean + input.readNoiseElectrons ** 2 + input.gainElectronsPerCount ** 2 / 12;
        return sum + (slopes[i]![px]! * slopes[j]![px]!) / variance;
      }, 0),
    ),
  );
  fisher[4]![4]! += 1 / input.fwhmSigmaNm ** 2;
  return Math.sqrt(inverseFirstDiagonal(fisher));
}

function pixelsAbout({ firstNm, pixelNm, halfWindowNm }: FisherInput, nm: number): number[] {
  const from = Math.ceil((nm - halfWindowNm - firstNm) / pixelNm);
  const to = Math.floor((nm + halfWindowNm - firstNm) / pixelNm);
  return Array.from({ length: to - from + 1 }, (_, i) => firstNm + (from + i) * pixelNm);
}

function brightestScale(input: FisherInput, pixels: readonly number[][]): number {
  const start = [input.kelvin, 0, 0, 0, input.fwhmNm, input.starkFwhmNm, ...lines.flatMap(() => [0, 0])];
  const bare = model({ ...input, continuumElectrons: 0 }, pixels, 1, start);
  return input.brightestPixelElectrons / Math.max(...bare);
}

function model(
  input: FisherInput,
  pixels: readonly number[][],
  scale: number,
  at: readonly number[],
): number[] {
  const [kelvin, lnScale, offset, stretch, fwhm, stark] = at as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return pixels.flatMap((centres, index) => {
    const line = lines[index]!;
    const area =
      scale *
      Math.exp(lnScale) *
      line.weightTimesA *
      Math.exp(-(line.energyEv - 12.0875) / (boltzmannEvPerK * kelvin));
    const centre = line.nm + offset + stretch * (line.nm - 500);
    return centres.map((nm) => {
      const u = (nm - line.nm) / input.halfWindowNm;
      const share = pixelShare(
        nm - centre,
        input.pixelNm,
        fwhm / 2.3548200450309493,
        (line.starkRatio * stark) / 2,
      );
      return input.continuumElectrons + at[6 + 2 * index]! + at[7 + 2 * index]! * u + area * share;
    });
  });
}

/** (1/pi) integral over k of exp(-s^2 k^2/2 - g k) cos(k x) 2 sin(k h/2)/k, by Simpson's rule. */
function pixelShare(x: number, h: number, s: number, g: number): number {
  const count = 400;
  const step = 7 / s / count;
  let sum = 0;
  for (let i = 0; i <= count; i++) {
    const k = i * step;
    const weight = i === 0 || i === count ? 1 : i % 2 === 1 ? 4 : 2;
    const pixel = k === 0 ? h : (2 * Math.sin((k * h) / 2)) / k;
    sum += weight * Math.exp((-s * s * k * k) / 2 - g * k) * Math.cos(k * x) * pixel;
  }
  return (sum * step) / (3 * Math.PI);
}

/** First diagonal element of the inverse, by Gauss-Jordan elimination with row scaling. */
function inverseFirstDiagonal(matrix: readonly number[][]): number {
  const size = matrix.length;
  const scales = matrix.map((row, i) => 1 / Math.sqrt(row[i]!));
  const work = matrix.map((row, i) => [
    ...row.map((value, j) => value * scales[i]! * scales[j]!),
    i === 0 ? 1 : 0,
  ]);
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++) {
      if (Math.abs(work[row]![column]!) > Math.abs(work[pivot]![column]!)) pivot = row;
    }
    [work[column], work[pivot]] = [work[pivot]!, work[column]!];
    for (let row = 0; row < size; row++) {
      if (row === column) continue;
      const factor = work[row]![column]! / work[column]![column]!;
      for (let j = column; j <= size; j++) work[row]![j]! -= factor * work[column]![j]!;
    }
  }
  return (work[0]![size]! / work[0]![0]!) * scales[0]! ** 2;
}
