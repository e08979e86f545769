import { atan, cos, exp, log, pow, sin } from '../../../shared-core/numeric/portable-math.ts';

/**
 * Models of the NIST nonlinear data sets, one observation at a time: returns the value and writes the derivatives.
 * b holds the parameters, x the predictors of the observation.
 */
export type PointModel = (b: Float64Array, x: readonly number[], slope: Float64Array) => number;

/** b0 (1 - exp(-b1 x)) */
const saturation: PointModel = (b, [x = 0], slope) => {
  const decay = exp(-b[1]! * x);
  slope[0] = 1 - decay;
  slope[1] = b[0]! * x * decay;
  return b[0]! * (1 - decay);
};

/** b0 (1 - (1 + b1 x / 2)^-2) */
const misra1b: PointModel = (b, [x = 0], slope) => {
  const base = 1 + (b[1]! * x) / 2;
  slope[0] = 1 - 1 / (base * base);
  slope[1] = (b[0]! * x) / (base * base * base);
  return b[0]! * slope[0];
};

/** b0 (1 - (1 + 2 b1 x)^-1/2) */
const misra1c: PointModel = (b, [x = 0], slope) => {
  const base = 1 + 2 * b[1]! * x;
  slope[0] = 1 - 1 / Math.sqrt(base);
  slope[1] = (b[0]! * x) / (base * Math.sqrt(base));
  return b[0]! * slope[0];
};

/** b0 b1 x / (1 + b1 x) */
const misra1d: PointModel = (b, [x = 0], slope) => {
  const base = 1 + b[1]! * x;
  slope[0] = (b[1]! * x) / base;
  slope[1] = (b[0]! * x) / (base * base);
  return b[0]! * slope[0];
};

/** exp(-b0 x) / (b1 + b2 x) */
const chwirut: PointModel = (b, [x = 0], slope) => {
  const base = b[1]! + b[2]! * x;
  const value = exp(-b[0]! * x) / base;
  slope[0] = -x * value;
  slope[1] = -value / base;
  slope[2] = (-x * value) / base;
  return value;
};

/** b0 exp(-b1 x) + b2 exp(-b3 x) + b4 exp(-b5 x) */
const lanczos: PointModel = (b, [x = 0], slope) => {
  let value = 0;
  for (let k = 0; k < 6; k += 2) {
    const decay = exp(-b[k + 1]! * x);
    slope[k] = decay;
    slope[k + 1] = -x * b[k]! * decay;
    value += b[k]! * decay;
  }
  return value;
};

/** b0 exp(-b1 x) + b2 exp(-((x - b3) / b4)^2) + b5 exp(-((x - b6) / b7)^2) */
const gauss: PointModel = (b, [x = 0], slope) => {
  const decay = exp(-b[1]! * x);
  slope[0] = decay;
  slope[1] = -x * b[0]! * decay;
  let value = b[0]! * decay;
  for (const k of [2, 5]) {
    const distance = (x - b[k + 1]!) / b[k + 2]!;
    const bell = exp(-distance * distance);
    slope[k] = bell;
    slope[k + 1] = (2 * b[k]! * bell * distance) / b[k + 2]!;
    slope[k + 2] = slope[k + 1]! * distance;
    value += b[k]! * bell;
  }
  return value;
};

/** b0 x^b1 */
const danWood: PointModel = (b, [x = 0], slope) => {
  const power = pow(x, b[1]!);
  slope[0] = power;
  slope[1] = b[0]! * power * log(x);
  return b[0]! * power;
};

/** (b0 + b1 x + ...) / (1 + ... x + ...), degrees of numerator and denominator the same. */
const rational =
  (degree: number): PointModel =>
  (b, [x = 0], slope) => {
    let top = 0;
    let bottom = 0;
    for (let k = degree; k >= 0; k--) top = top * x + b[k]!;
    for (let k = degree; k >= 1; k--) bottom = (bottom + b[degree + k]!) * x;
    bottom += 1;
    const value = top / bottom;
    for (let k = 0, power = 1; k <= degree; k++, power *= x) {
      slope[k] = power / bottom;
      if (k > 0) slope[degree + k] = (-value * power) / bottom;
    }
    return value;
  };

/** b0 - b1 x1 exp(-b2 x2), of the logarithm of the observation. */
const nelson: PointModel = (b, [time = 0, temperature = 0], slope) => {
  const decay = exp(-b[2]! * temperature);
  slope[0] = 1;
  slope[1] = -time * decay;
  slope[2] = b[1]! * time * temperature * decay;
  return b[0]! - b[1]! * time * decay;
};

/** b0 + b1 exp(-b3 x) + b2 exp(-b4 x) */
const mgh17: PointModel = (b, [x = 0], slope) => {
  const first = exp(-x * b[3]!);
  const second = exp(-x * b[4]!);
  slope[0] = 1;
  slope[1] = first;
  slope[2] = second;
  slope[3] = -x * b[1]! * first;
  slope[4] = -x * b[2]! * second;
  return b[0]! + b[1]! * first + b[2]! * second;
};

/** b0 - b1 x - atan(b2 / (x - b3)) / pi */
const roszman: PointModel = (b, [x = 0], slope) => {
  const distance = x - b[3]!;
  const sum = distance * distance + b[2]! * b[2]!;
  slope[0] = 1;
  slope[1] = -x;
  slope[2] = -distance / sum / Math.PI;
  slope[3] = -b[2]! / sum / Math.PI;
  return b[0]! - b[1]! * x - atan(b[2]! / distance) / Math.PI;
};

/** b0 + yearly cycle (b1, b2) + cycles of periods b3 (b4, b5) and b6 (b7, b8) */
const enso: PointModel = (b, [x = 0], slope) => {
  const turn = 2 * Math.PI * x;
  slope[0] = 1;
  slope[1] = cos(turn / 12);
  slope[2] = sin(turn / 12);
  let value = b[0]! + b[1]! * slope[1] + b[2]! * slope[2];
  for (const k of [3, 6]) {
    const angle = turn / b[k]!;
    const c = cos(angle);
    const s = sin(angle);
    slope[k + 1] = c;
    slope[k + 2] = s;
    slope[k] = ((b[k + 1]! * s - b[k + 2]! * c) * angle) / b[k]!;
    value += b[k + 1]! * c + b[k + 2]! * s;
  }
  return value;
};

/** b0 (x^2 + b1 x) / (x^2 + b2 x + b3) */
const mgh09: PointModel = (b, [x = 0], slope) => {
  const top = x * x + x * b[1]!;
  const bottom = x * x + x * b[2]! + b[3]!;
  const value = (b[0]! * top) / bottom;
  slope[0] = top / bottom;
  slope[1] = (b[0]! * x) / bottom;
  slope[2] = (-value * x) / bottom;
  slope[3] = -value / bottom;
  return value;
};

/** b0 exp(b1 / (x + b2)) */
const mgh10: PointModel = (b, [x = 0], slope) => {
  const base = x + b[2]!;
  const growth = exp(b[1]! / base);
  slope[0] = growth;
  slope[1] = (b[0]! * growth) / base;
  slope[2] = (-b[0]! * growth * b[1]!) / (base * base);
  return b[0]! * growth;
};

/** b0 / (1 + exp(b1 - b2 x)) */
const rat42: PointModel = (b, [x = 0], slope) => {
  const growth = exp(b[1]! - b[2]! * x);
  const bottom = 1 + growth;
  const value = b[0]! / bottom;
  slope[0] = 1 / bottom;
  slope[1] = (-value * growth) / bottom;
  slope[2] = (x * value * growth) / bottom;
  return value;
};

/** b0 / (1 + exp(b1 - b2 x))^(1 / b3) */
const rat43: PointModel = (b, [x = 0], slope) => {
  const growth = exp(b[1]! - b[2]! * x);
  const power = pow(1 + growth, -1 / b[3]!);
  const value = b[0]! * power;
  slope[0] = power;
  slope[1] = (-value * growth) / (1 + growth) / b[3]!;
  slope[2] = -x * slope[1];
  slope[3] = (value * log(1 + growth)) / (b[3]! * b[3]!);
  return value;
};

/** b0 / b1 exp(-((x - b2) / b1)^2 / 2) */
const eckerle: PointModel = (b, [x = 0], slope) => {
  const distance = (x - b[2]!) / b[1]!;
  const bell = exp(-0.5 * distance * distance) / b[1]!;
  const value = b[0]! * bell;
  slope[0] = bell;
  slope[1] = (value * (distance * distance - 1)) / b[1]!;
  slope[2] = (value * distance) / b[1]!;
  return value;
};

/** b0 (b1 + x)^(-1 / b2); not a number where the base is negative. */
const bennett: PointModel = (b, [x = 0], slope) => {
  const base = b[1]! + x;
  const power = pow(base, -1 / b[2]!);
  const value = b[0]! * power;
  slope[0] = power;
  slope[1] = -value / (base * b[2]!);
  slope[2] = (value * log(base)) / (b[2]! * b[2]!);
  return value;
};

/** By the name of the data set. */
export const nonlinearModels: Readonly<Record<string, PointModel>> = {
  Bennett5: bennett,
  BoxBOD: saturation,
  Chwirut1: chwirut,
  Chwirut2: chwirut,
  DanWood: danWood,
  ENSO: enso,
  Eckerle4: eckerle,
  Gauss1: gauss,
  Gauss2: gauss,
  Gauss3: gauss,
  Hahn1: rational(3),
  Kirby2: rational(2),
  Lanczos1: lanczos,
  Lanczos2: lanczos,
  Lanczos3: lanczos,
  MGH09: mgh09,
  MGH10: mgh10,
  MGH17: mgh17,
  Misra1a: saturation,
  Misra1b: misra1b,
  Misra1c: misra1c,
  Misra1d: misra1d,
  Nelson: nelson,
  Rat42: rat42,
  Rat43: rat43,
  Roszman1: roszman,
  Thurber: rational(3),
};
