import { describe, expect, test } from 'vitest';
import { voigtFwhmNm, voigtPixel, type PixelShare } from '../../shared-core/numeric/voigt-pixel.ts';
import { gaussianFwhmPerSigma, type VoigtShape } from '../../shared-core/numeric/voigt-run.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

function pixel(shape: VoigtShape, fromNm: number, toNm: number): PixelShare {
  const out = { share: 0, byCentre: 0, byGaussianFwhm: 0, byLorentzianFwhm: 0 };
  voigtPixel(shape, fromNm, toNm, out);
  return out;
}

describe('share of a pixel', () => {
  test('is the integral over it', () => {
    const keys = checkKeys(/^voigt\.bin_integral/);
    expect(keys).toHaveLength(9);
    for (const key of keys) {
      const { inputs, expected, source } = checkValue(key);
      const [from, to, sigma, gamma] = ['a', 'b', 'sigma', 'gamma_HWHM'].map((name) =>
        numberInput(inputs, name),
      );
      const shape = {
        centreNm: 0,
        gaussianFwhmNm: sigma! * gaussianFwhmPerSigma,
        lorentzianFwhmNm: 2 * gamma!,
      };
      // The promise: 1e-6 of the largest share, here up to 0.7 and 0.97 over twenty widths.
      expectClose(pixel(shape, from!, to!).share, {
        expected: Number(expected),
        abs: 1e-6,
        because: `${key}; ${source}`,
      });
    }
  });

  test.each([
    [0.05, 0],
    [0.18, 0],
    [0.18, 0.02],
    [0.18, 0.4],
    [0.5, 3],
  ])(
    'Gaussian %d and Lorentzian %d nm: shares of all pixels fill the area up to the far wings',
    (gauss, lorentz) => {
      const shape = { centreNm: 500.037, gaussianFwhmNm: gauss, lorentzianFwhmNm: lorentz };
      let sum = 0;
      const reach = 40;
      for (let i = -400; i < 400; i++) sum += pixel(shape, 500 + i * 0.1, 500 + (i + 1) * 0.1).share;
      // Beyond +-x a Lorentz wing holds the share fL/(pi x).
      expectClose(sum, {
        expected: 1 - lorentz / Math.PI / reach,
        abs: 2e-5 + lorentz * 1e-5,
        because: 'unit area',
      });
    },
  );

  test('two halves make one pixel', () => {
    const shape = { centreNm: 0.02, gaussianFwhmNm: 0.2, lorentzianFwhmNm: 0.05 };
    for (const from of [-1, -0.3, -0.05, 0, 0.2, 2]) {
      const halves = pixel(shape, from, from + 0.05).share + pixel(shape, from + 0.05, from + 0.1).share;
      expectClose(pixel(shape, from, from + 0.1).share, { expected: halves, abs: 1e-6, because: 'addition' });
    }
  });
});

describe('derivatives', () => {
  const names = {
    centreNm: 'byCentre',
    gaussianFwhmNm: 'byGaussianFwhm',
    lorentzianFwhmNm: 'byLorentzianFwhm',
  } as const;
  const shapes: readonly VoigtShape[] = [
    { centreNm: 0.013, gaussianFwhmNm: 0.18, lorentzianFwhmNm: 0 },
    { centreNm: -0.04, gaussianFwhmNm: 0.18, lorentzianFwhmNm: 0.03 },
    { centreNm: 0, gaussianFwhmNm: 0.18, lorentzianFwhmNm: -0.03 },
    { centreNm: 0.1, gaussianFwhmNm: 0.3, lorentzianFwhmNm: 1.2 },
  ];

  test.each(shapes)('by finite differences, $gaussianFwhmNm and $lorentzianFwhmNm nm', (shape) => {
    for (const [parameter, name] of Object.entries(names) as [keyof VoigtShape, keyof PixelShare][]) {
      for (let from = -1.35; from < 1.35; from += 0.09) {
        const step = 1e-5;
        const up = pixel({ ...shape, [parameter]: shape[parameter] + step }, from, from + 0.09).share;
        const down = pixel({ ...shape, [parameter]: shape[parameter] - step }, from, from + 0.09).share;
        // Largest slopes are about 4 per nm; the quadrature's own error differs little between the two sides.
        expectClose(pixel(shape, from, from + 0.09)[name], {
          expected: (up - down) / (2 * step),
          abs: 2e-5,
          because: `${name} at ${String(from)}`,
        });
      }
    }
  });
});

describe('width of the whole profile', () => {
  test('is the published approximation, which misses the exact width by less than 2.4e-4', () => {
    for (const key of checkKeys(/^voigt\.fwhm_/)) {
      const { inputs, expected, source } = checkValue(key);
      const width = voigtFwhmNm(numberInput(inputs, 'fwhm_G'), numberInput(inputs, 'fwhm_L'));
      if (key.includes('Olivero')) expectCheckValue(key, width);
      else expectClose(width, { expected: Number(expected), rel: 2.4e-4, because: source });
    }
  });

  test('is that of either part where the other vanishes', () => {
    expect(voigtFwhmNm(0.2, 0)).toBe(0.2);
    expectClose(voigtFwhmNm(0, 0.2), { expected: 0.2, rel: 1e-4, because: 'pure Lorentz' });
  });
});
