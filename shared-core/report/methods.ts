import type { Diagnosis } from '../diagnosis/diagnosis.ts';

/** How one kind of number came about, with where the method is published. */
export interface Method {
  readonly quantity: string;
  readonly text: string;
  readonly sources: readonly string[];
}

/** The methods that this diagnosis used, in the order of the chain. */
export function methodsOf(diagnosis: Diagnosis): readonly Method[] {
  const { inputs, temperature, electronDensity, axis } = diagnosis;
  const methods: Method[] = [];
  if (axis.status === 'registered')
    methods.push({
      quantity: 'Wavelength axis',
      text: 'Offset and stretch come from the pattern of the Balmer lines in the recording itself; a reading is accepted only when chance and every rival reading are ruled out. Reference wavelengths are centroids of the fine structure.',
      sources: [
        'Bayesian matching by pairs, after the idea of D. Lang et al., Astron. J. 139, 1782 (2010)',
        'levels: A. Kramida, At. Data Nucl. Data Tables 96, 586 (2010)',
        'refractive index of air: P. E. Ciddor, Appl. Opt. 35, 1566 (1996); E. R. Peck, K. Reeder, J. Opt. Soc. Am. 62, 958 (1972)',
      ],
    });
  if (diagnosis.lines.some((line) => line.area !== null))
    methods.push({
      quantity: 'Line areas and widths',
      text: 'Voigt profiles integrated over each pixel, on a straight local baseline, are fitted to the recorded signal with weights from the model; clipped pixels take no part. The response is divided out of the areas afterwards.',
      sources: [
        'J. A. C. Weideman, SIAM J. Numer. Anal. 31, 1497 (1994), for the Voigt function',
        'D. W. Marquardt, J. SIAM 11, 431 (1963), for the fit; R. W. M. Wedderburn, Biometrika 61, 439 (1974), for the weights',
        'J. J. Olivero, R. L. Longbothum, J. Quant. Spectrosc. Radiat. Transfer 17, 233 (1977), for whole widths',
      ],
    });
  if (temperature.status !== 'not-determined')
    methods.push({
      quantity: 'Temperature',
      text: `From the slope of ln(population / weight) against upper energy, by generalised least squares with the covariance of noise, axis${inputs.response === null ? '' : ' and response'}${inputs.response === null ? '' : ` (response per ${inputs.response.per})`}. The interval is that of 1/T, so it is not symmetric in T.`,
      sources: [
        'H. R. Griem, Plasma Spectroscopy (1964), chapter 13',
        'transition probabilities: closed form of D. H. Menzel, C. L. Pekeris, Mon. Not. R. Astron. Soc. 96, 77 (1935); compared with W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref. Data 38, 565 (2009)',
        'constants: CODATA 2022 recommended values',
        'JCGM 100:2008 (GUM), for the propagation of uncertainty, the budget and the rounding',
      ],
    });
  if (diagnosis.monteCarlo !== null)
    methods.push({
      quantity: 'Monte Carlo check',
      text: 'Areas and errors of calibration are drawn from their joint distribution and the temperature is fitted anew to each draw, in batches until mean, uncertainty and both ends of the interval of 1/T are stable. Where the ends differ from those of the first order by more than half a unit of the first digit of the uncertainty, those of the trials stand.',
      sources: ['JCGM 101:2008, clauses 7 and 8'],
    });
  if (electronDensity.status !== 'not-determined')
    methods.push({
      quantity: 'Electron density',
      text: 'From the Stark width left after the instrument, Doppler, fine-structure, natural and van der Waals parts. The uncertainty of the width law is part of the interval; where the rest cannot be told from zero an upper limit stands instead.',
      sources: [
        'M. A. Gigosos, M. A. Gonzalez, V. Cardenoso, Spectrochim. Acta B 58, 1489 (2003)',
        'van der Waals broadening: H. R. Griem, Plasma Spectroscopy (1964), chapter 4',
      ],
    });
  if (temperature.status !== 'not-determined')
    methods.push({
      quantity: 'What the temperature may be read as',
      text: 'An electron temperature only where the density, at the low end of its interval, keeps every level in use in partial equilibrium with the free electrons.',
      sources: ['H. R. Griem, Phys. Rev. 131, 1170 (1963)'],
    });
  return methods;
}
