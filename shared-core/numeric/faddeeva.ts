/** Half-width of the conformal map: L = sqrt(N / sqrt 2) with N = 32. */
const mapHalfWidth = 4.756828460010884;
const inverseSqrtPi = 0.5641895835477563;

/** Coefficients a_1 to a_32, computed by test/tools/weideman-coefficients.py. */
const coefficients = Float64Array.from([
  2.5722534081245696, 2.2635372999002676, 1.8256696296324815, 1.345544169234545, 0.9019254893647999,
  0.5460139720639341, 0.2954445107150873, 0.14060716226893769, 0.05730440352983722, 0.019006155784845408,
  0.004519541105349217, 0.0003925913607007031, -0.0002453298027002143, -0.00013075449254615346,
  -2.140961920171075e-5, 6.821031944001985e-6, 4.40153173157855e-6, 4.2558331375750085e-7,
  -4.1840763702169776e-7, -1.4813078915120977e-7, 2.2930439065099966e-8, 2.3797556779897417e-8,
  8.124889456846652e-10, -3.208015091723369e-9, -5.231020481196329e-10, 4.153743091833453e-10,
  1.1658251093523774e-10, -5.5442359481664624e-11, -2.154363207783877e-11, 8.03036789996389e-12,
  3.7408812931653625e-12, -1.3031797863050087e-12,
]);
const coefficientCount = 32;

/** Beyond |z| = 10.5 the six-point convergent is better than 1e-11 of w, in a fraction of the time. */
const farSquared = 110;

/** Receives Re w and Im w, so that the hot loops allocate nothing. */
export interface ComplexOut {
  re: number;
  im: number;
}

/**
 * Faddeeva function w(z) = exp(-z^2) erfc(-i z), z = x + i y.
 *
 * w(z) ~ 2 P(Z) / (L - i z)^2 + pi^(-1/2) / (L - i z), Z = (L + i z)/(L - i z), P of degree 31.
 *
 * @param x    real part, any finite number
 * @param y    imaginary part, >= -0.5. For y >= 0 the error is below 1e-12 of the peak; the series continues
 *             analytically below the axis and loses two digits at y = -0.5, where the fit never goes further
 * @param out  receives the real and imaginary part
 * @source [Weideman1994], N = 32
 * @check  test/reference/faddeeva.test.ts
 */
export function faddeeva(x: number, y: number, out: ComplexOut): void {
  if (x * x + y * y > farSquared) {
    farFaddeeva(x, y, out);
    return;
  }
  // L - i z = (L + y) - i x ; L + i z = (L - y) + i x
  const dRe = mapHalfWidth + y;
  const inverse = 1 / (dRe * dRe + x * x);
  const rRe = dRe * inverse; // 1 / (L - i z)
  const rIm = x * inverse;
  const nRe = mapHalfWidth - y;
  const zRe = nRe * rRe - x * rIm;
  const zIm = nRe * rIm + x * rRe;
  // P(Z) = E(Z^2) + Z O(Z^2): two short sums that the processor works on side by side. Their coefficients are real, so
  // the two-term recurrence in (2 Re Z^2, |Z^2|^2) needs half the multiplications of a complex Horner scheme.
  const uRe = zRe * zRe - zIm * zIm;
  const uIm = 2 * zRe * zIm;
  const p = uRe + uRe;
  const q = uRe * uRe + uIm * uIm;
  let even1 = 0;
  let even2 = 0;
  let odd1 = 0;
  let odd2 = 0;
  for (let n = coefficientCount - 2; n >= 2; n -= 2) {
    const even = coefficients[n]! + p * even1 - q * even2;
    const odd = coefficients[n + 1]! + p * odd1 - q * odd2;
    even2 = even1;
    even1 = even;
    odd2 = odd1;
    odd1 = odd;
  }
  const oddRe = coefficients[1]! + uRe * odd1 - q * odd2;
  const oddIm = uIm * odd1;
  const pRe = coefficients[0]! + uRe * even1 - q * even2 + zRe * oddRe - zIm * oddIm;
  const pIm = uIm * even1 + zRe * oddIm + zIm * oddRe;
  // 2 P r^2 + r / sqrt(pi) = r (2 P r + 1/sqrt(pi))
  const tRe = 2 * (pRe * rRe - pIm * rIm) + inverseSqrtPi;
  const tIm = 2 * (pRe * rIm + pIm * rRe);
  out.re = tRe * rRe - tIm * rIm;
  out.im = tRe * rIm + tIm * rRe;
}

/**
 * Far from the origin: w ~ (i/sqrt pi) z (u^2 - 7 u + 33/4) / (u^3 - 15/2 u^2 + 45/4 u - 15/8), u = z^2, the sixth
 * convergent of Laplace's continued fraction.
 * @source [Gautschi1970]
 */
function farFaddeeva(x: number, y: number, out: ComplexOut): void {
  const uRe = x * x - y * y;
  const uIm = 2 * x * y;
  const vRe = uRe * uRe - uIm * uIm;
  const vIm = 2 * uRe * uIm;
  const aRe = vRe - 7 * uRe + 8.25;
  const aIm = vIm - 7 * uIm;
  const nRe = x * aRe - y * aIm;
  const nIm = x * aIm + y * aRe;
  // u^3 - 7.5 u^2 + 11.25 u - 1.875
  const dRe = vRe * uRe - vIm * uIm - 7.5 * vRe + 11.25 * uRe - 1.875;
  const dIm = vRe * uIm + vIm * uRe - 7.5 * vIm + 11.25 * uIm;
  const scale = inverseSqrtPi / (dRe * dRe + dIm * dIm);
  const qRe = (nRe * dRe + nIm * dIm) * scale;
  const qIm = (nIm * dRe - nRe * dIm) * scale;
  out.re = -qIm;
  out.im = qRe;
}
