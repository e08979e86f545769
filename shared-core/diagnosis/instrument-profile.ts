import type { MeasuredProfile, WhyNoProfile } from '../instrument/measure-profile.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** How the instrument draws a narrow line, as the reference lamp shows it. */
export function instrumentProfileSection(
  { profile }: Evidence,
  file: { readonly name: string } | null,
): Diagnosis['instrumentProfile'] {
  if (profile === null) return null;
  if (typeof profile === 'string') {
    return {
      status: 'not-measured',
      shape: null,
      fwhmNm: null,
      fwhmSigmaNm: null,
      lorentzShare: null,
      lorentzShareSigma: null,
      linesNm: [],
      reducedChiSquare: null,
      text: `The instrument profile was not measured: ${whyNot[profile]}`,
    };
  }
  const { shape, fwhmNm, fwhmSigmaNm, lorentzShare, lorentzShareSigma, linesNm } = profile;
  return {
    status: 'measured',
    shape,
    fwhmNm,
    fwhmSigmaNm,
    lorentzShare,
    lorentzShareSigma,
    linesNm: [...linesNm],
    reducedChiSquare: profile.chiSquare / profile.degreesOfFreedom,
    text: measuredText(profile, file?.name ?? 'the reference lamp'),
  };
}

const whyNot: Readonly<Record<WhyNoProfile, string>> = Object.freeze({
  smoothed: 'the reference recording is smoothed. Export it without smoothing.',
  'no-lines':
    'the reference recording shows no strong line that stands alone and is not clipped. Take a lamp with sharp lines (mercury, neon) at an exposure that clips none of them.',
  'not-converged':
    'the lines of the reference recording follow no single shape. Check focus, slit and the even filling of the grating.',
});

function measuredText(profile: MeasuredProfile, name: string): string {
  const { shape, fwhmNm, fwhmSigmaNm, lorentzShare, linesNm, chiSquare, degreesOfFreedom } = profile;
  const count = linesNm.length === 1 ? 'one line' : `${String(linesNm.length)} lines`;
  const form =
    shape === 'tabulated'
      ? 'a tabulated shape, since no mixture of Gaussian and Lorentzian fits'
      : `Lorentz share ${plain(lorentzShare!, 2)}`;
  const alone =
    linesNm.length === 1 ? ' One line cannot show how the width changes: 2 % are allowed for it.' : '';
  return `Instrument profile from ${count} of ${name}: FWHM ${plain(fwhmNm, 4)} nm with sigma ${plain(fwhmSigmaNm, 2)} nm, ${form} (chi-square ${plain(chiSquare, 3)} for ${String(degreesOfFreedom)} degrees of freedom).${alone}`;
}
