import { invert, pixelShare } from './fisher-profile.ts';

/**
 * Cramer-Rao bounds of temperature and electron density, by a Fisher matrix that shares no code with the program.
 *
 * Pixel-integrated Voigt profiles from their Fourier integral; level energies and transition probabilities from published
 * tables: A. Kramida, At. Data Nucl. Data Tables 96, 586 (2010); W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref. Data 38, 565
 * (2009); wavelengths J. Reader, Appl. Spectrosc. 58, 1469 (2004), from H-8 on from the Rydberg formula in air. What is
 * believed beforehand, with its uncertainty, enters as information (H. L. Van Trees, Detection, Estimation, and Modulation
 * Theory I, 1968, sec. 2.4): the bound is then that of draws in which the truth is drawn from that belief, too.
 */
interface TabulatedLine {
  readonly level: number;
  readonly nm: number;
  readonly energyEv: number;
  readonly weightTimesA: number;
  /** Lorentz width over H-beta's, and how far a line may depart from it, relative 1 sigma. */
  readonly starkRatio: number;
  readonly starkSigma: number;
}

const scaledStark = (level: number, nm: number): number =>
  (0.95 * (nm / 486.13) ** 2 * level * (level - 1)) / 12;
const higher = (level: number, nm: number, energyEv: number, a: number): TabulatedLine => ({
  level,
  nm,
  energyEv,
  weightTimesA: 2 * level * level * a,
  starkRatio: scaledStark(level, nm),
  starkSigma: 0.25,
});

const lines: readonly TabulatedLine[] = [
  {
    level: 3,
    nm: 656.2795,
    energyEv: 12.08750516,
    weightTimesA: 18 * 4.4101e7,
    starkRatio: 0.229,
    starkSigma: 0.1,
  },
  {
    level: 4,
    nm: 486.1325,
    energyEv: 12.74853932,
    weightTimesA: 32 * 8.4193e6,
    starkRatio: 1,
    starkSigma: 0.02,
  },
  {
    level: 5,
    nm: 434.0463,
    energyEv: 13.05450169,
    weightTimesA: 50 * 2.5304e6,
    starkRatio: 1.25,
    starkSigma: 0.15,
  },
  {
    level: 6,
    nm: 410.1735,
    energyEv: 13.22070389,
    weightTimesA: 72 * 9.732e5,
    starkRatio: 2.1,
    starkSigma: 0.15,
  },
  higher(7, 397.0072, 13.32091817, 4.3889e5),
  higher(8, 388.9049, 13.38596103, 2.2148e5),
  higher(9, 383.5384, 13.43055424, 1.2156e5),
  higher(10, 379.7897, 13.46245155, 7.1225e4),
  higher(11, 377.063, 13.48605194, 4.3972e4),
  higher(12, 375.0152, 13.50400193, 2.8337e4),
];
const highestAnalysed = 7;
const boltzmannEvPerK = 8.617333262e-5;
const fwhmPerSigma = 2.3548200450309493;
/** Width law of H-beta: M. A. Gigosos, M. A. Gonzalez, V. Cardenoso, Spectrochim. Acta B 58, 1489 (2003). */
const stark = { nmAt1e23: 4.8, exponent: 0.68116, relativeSigma: 0.07 };
/** Deuterium lines lie this much lower, relative: difference of the reduced masses. */
const isotopeShift = 2.7202e-4;

export interface FisherInput {
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  readonly brightestPixelElectrons: number;
  readonly continuumElectrons: number;
  /** Gaussian width of the lines: instrument and Doppler. */
  readonly fwhmNm: number;
  readonly fwhmSigmaNm: number;
  readonly readNoiseElectrons: number;
  /** Electrons to a step of the digitiser. */
  readonly gainElectronsPerCount: number;
  readonly pixelNm: number;
  readonly firstNm: number;
  readonly lastNm: number;
  /** Half of the stretch of pixels about each line that is taken to inform, nm, to which eight Stark widths are added. */
  readonly halfWindowNm: number;
  /** Whether the widths depart from the width laws by what the laws are uncertain of, or follow them exactly. */
  readonly starkErrors: boolean;
  /** Deuterium over hydrogen; a free parameter when given. */
  readonly deuteriumRatio?: number;
  /** Lines of other gases at known wavelengths, of free area. */
  readonly companions?: readonly {
    readonly nm: number;
    readonly level: number;
    readonly relativeArea: number;
  }[];
  /** Errors of the response, correlated as exp(-distance / length). */
  readonly response?: { readonly relativeSigma: number; readonly correlationLengthNm: number };
}

export interface Bounds {
  /** Smallest standard deviation, K, that an unbiased estimate of the temperature can have. */
  readonly kelvin: number;
  /** The same of the logarithm of the electron density. */
  readonly lnDensity: number;
}

/** Parameters that all lines share come first, those of single lines, companions and segments follow in blocks. */
const shared = {
  kelvin: 0,
  lnDensity: 1,
  lnScale: 2,
  offset: 3,
  stretch: 4,
  fwhm: 5,
  lnStark: 6,
  lnDeuterium: 7,
};
const sharedCount = 8;

interface Segment {
  readonly fromNm: number;
  readonly toNm: number;
}

export function fisherBounds(input: FisherInput): Bounds {
  const inside = lines.filter(({ nm }) => nm > input.firstNm - 2 && nm < input.lastNm + 2);
  const companions = input.companions ?? [];
  const segments = segmentsOf(input, inside);
  const departureAt = sharedCount;
  const responseAt = departureAt + inside.length;
  const areaAt = responseAt + inside.length;
  const companionAt = areaAt + inside.length;
  const baselineAt = companionAt + companions.length;
  const size = baselineAt + 2 * segments.length;

  const rows: { mean: number; slopes: Float64Array }[] = [];
  for (const [index, { fromNm, toNm }] of segments.entries()) {
    const first = Math.ceil((fromNm - input.firstNm) / input.pixelNm);
    const last = Math.floor((toNm - input.firstNm) / input.pixelNm);
    for (let px = first; px <= last; px++) {
      const nm = input.firstNm + px * input.pixelNm;
      const slopes = new Float64Array(size);
      let mean = 0;
      const add = (
        centreNm: number,
        area: number,
        starkNm: number,
        then: (light: number) => void,
      ): number => {
        const { share, byX, bySigma, byGamma } = pixelShare(
          nm - centreNm,
          input.pixelNm,
          input.fwhmNm / fwhmPerSigma,
          starkNm / 2,
        );
        mean += area * share;
        slopes[shared.offset]! -= area * byX;
        slopes[shared.stretch]! -= area * byX * (centreNm - 500);
        slopes[shared.fwhm]! += (area * bySigma) / fwhmPerSigma;
        then(area * share);
        return area * byGamma * (starkNm / 2);
      };
      for (const [at, line] of inside.entries()) {
        if (Math.abs(nm - line.nm) > 30) continue;
        const area = areaOf(line, input.kelvin);
        const starkNm = line.starkRatio * starkNmAt(input.electronsPerCubicMetre);
        const byTemperature = (line.energyEv - lines[0]!.energyEv) / (boltzmannEvPerK * input.kelvin ** 2);
        const isAnalysed = line.level <= highestAnalysed;
        const isotopes = [1, ...(input.deuteriumRatio === undefined ? [] : [input.deuteriumRatio])];
        for (const [isotope, ratio] of isotopes.entries()) {
          const centre = line.nm * (1 - isotope * isotopeShift);
          const byLnStark = add(centre, ratio * area, starkNm, (light) => {
            if (isAnalysed) slopes[shared.kelvin]! += light * byTemperature;
            else slopes[areaAt + at]! += light;
            slopes[shared.lnScale]! += light;
            slopes[responseAt + at]! += light;
            if (isotope === 1) slopes[shared.lnDeuterium]! += light;
          });
          slopes[shared.lnStark]! += byLnStark;
          slopes[departureAt + at]! += byLnStark;
          slopes[shared.lnDensity]! += stark.exponent * byLnStark;
        }
      }
      for (const [at, companion] of companions.entries()) {
        const host = inside.find(({ level }) => level === companion.level)!;
        add(companion.nm, companion.relativeArea * areaOf(host, input.kelvin), 0, (light) => {
          slopes[companionAt + at]! += light;
        });
      }
      slopes[baselineAt + 2 * index] = 1;
      slopes[baselineAt + 2 * index + 1] = (2 * (nm - fromNm)) / (toNm - fromNm) - 1;
      rows.push({ mean, slopes });
    }
  }
  const scale = input.brightestPixelElectrons / Math.max(...rows.map(({ mean }) => mean));
  const fisher = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  for (const { mean, slopes } of rows) {
    const electrons = mean * scale + input.continuumElectrons;
    const variance = electrons + input.readNoiseElectrons ** 2 + input.gainElectronsPerCount ** 2 / 12;
    // Baselines are in electrons already.
    const scaled = slopes.map((slope, at) => (at < baselineAt ? scale * slope : slope));
    for (let i = 0; i < size; i++) {
      if (scaled[i] === 0) continue;
      for (let j = 0; j < size; j++) fisher[i]![j]! += (scaled[i]! * scaled[j]!) / variance;
    }
  }
  const believe = (at: number, sigma: number): void => {
    fisher[at]![at]! += 1 / (sigma * sigma);
  };
  const exactly = 1e-9;
  believe(shared.fwhm, input.fwhmSigmaNm);
  believe(shared.lnStark, input.starkErrors ? stark.relativeSigma : exactly);
  believe(shared.lnDeuterium, input.deuteriumRatio === undefined ? exactly : 1e3);
  for (const [at, line] of inside.entries()) {
    believe(departureAt + at, input.starkErrors ? line.starkSigma : exactly);
    believe(areaAt + at, line.level <= highestAnalysed ? exactly : 1e3);
    if (input.response === undefined) believe(responseAt + at, exactly);
  }
  const { response } = input;
  if (response !== undefined) {
    const covariance = inside.map((a) =>
      inside.map(
        (b) => response.relativeSigma ** 2 * Math.exp(-Math.abs(a.nm - b.nm) / response.correlationLengthNm),
      ),
    );
    for (const [i, row] of invert(covariance).entries())
      for (const [j, value] of row.entries()) fisher[responseAt + i]![responseAt + j]! += value;
  }
  const covariance = invert(fisher);
  return { kelvin: Math.sqrt(covariance[0]![0]!), lnDensity: Math.sqrt(covariance[1]![1]!) };
}

const areaOf = ({ weightTimesA, energyEv }: TabulatedLine, kelvin: number): number =>
  weightTimesA * 1e-8 * Math.exp(-(energyEv - lines[0]!.energyEv) / (boltzmannEvPerK * kelvin));

const starkNmAt = (electronsPerCubicMetre: number): number =>
  stark.nmAt1e23 * (electronsPerCubicMetre / 1e23) ** stark.exponent;

/** Stretches about the analysed lines, those that touch joined. */
function segmentsOf(input: FisherInput, inside: readonly TabulatedLine[]): Segment[] {
  const segments: Segment[] = [];
  for (const { nm, starkRatio } of inside
    .filter(({ level }) => level <= highestAnalysed)
    .sort((a, b) => a.nm - b.nm)) {
    const half = input.halfWindowNm + 8 * starkRatio * starkNmAt(input.electronsPerCubicMetre);
    const segment = {
      fromNm: Math.max(input.firstNm, nm - half),
      toNm: Math.min(input.lastNm, nm + half),
    };
    const before = segments.at(-1);
    if (before !== undefined && segment.fromNm <= before.toNm)
      segments.splice(-1, 1, { fromNm: Math.min(before.fromNm, segment.fromNm), toNm: segment.toNm });
    else segments.push(segment);
  }
  return segments;
}
