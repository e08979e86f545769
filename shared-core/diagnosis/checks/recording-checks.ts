import type { Check } from '../diagnosis.ts';
import { listNames, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Clipped pixels and lines lost to them. */
export function clippingCheck({ recording, fits }: Evidence): Check {
  let pixelCount = 0;
  for (let i = 0; i < recording.clipped.length; i++) pixelCount += recording.clipped[i]!;
  const clipped: string[] = [];
  const compressed: string[] = [];
  for (const [id, obstacle] of fits.obstacles) {
    if (obstacle.kind === 'clipped') clipped.push(id);
    if (obstacle.kind === 'core-deficit') compressed.push(id);
  }
  const facts = {
    clippedPixelCount: pixelCount,
    clipLevel: recording.clipLevel,
    clippedLines: clipped.join(' '),
    compressedLines: compressed.join(' '),
  };
  if (clipped.length + compressed.length === 0) {
    return {
      id: 'clipping',
      verdict: 'sound',
      facts,
      text:
        pixelCount === 0
          ? 'No pixel is clipped.'
          : `${String(pixelCount)} pixels are clipped, none of them near a line in use.`,
      remedy: '',
    };
  }
  const parts: string[] = [];
  if (clipped.length > 0)
    parts.push(`${listNames(clipped)} clipped at ${plain(recording.clipLevel ?? NaN, 6)}`);
  if (compressed.length > 0) parts.push(`the top of ${listNames(compressed)} below what the flanks demand`);
  return {
    id: 'clipping',
    verdict: 'use with care',
    facts,
    text: `Found ${parts.join('; ')}; left out of the temperature.`,
    remedy:
      'Shorten the exposure until the strongest line stays below four fifths of full scale, and record again.',
  };
}

/** Pixels per line width: below two the profile is barely sampled. */
export function samplingCheck({ recording, search }: Evidence): Check {
  const { wavelengthNm } = recording;
  const pixelNm = (wavelengthNm[wavelengthNm.length - 1]! - wavelengthNm[0]!) / (wavelengthNm.length - 1);
  const pixelsPerWidth = search.fwhmNm / pixelNm;
  const isCoarse = pixelsPerWidth < 1.5;
  return {
    id: 'sampling',
    verdict: isCoarse ? 'use with care' : 'sound',
    facts: { pixelNm, fwhmNm: search.fwhmNm, pixelsPerWidth },
    text: `A line is ${plain(pixelsPerWidth, 2)} pixels wide at half height (${plain(search.fwhmNm, 2)} nm).`,
    remedy: isCoarse
      ? 'Use a finer pixel pitch or a wider slit: widths and faint areas are uncertain at this sampling.'
      : '',
  };
}

/** Where the noise came from. */
export function noiseCheck({ recording, fits }: Evidence): Check {
  const isCorrelated = recording.notes.some(({ code }) => code === 'noise-correlated');
  const { noise } = recording;
  const facts = {
    origin: noise.origin,
    gainElectronsPerCount: noise.gainElectronsPerCount,
    variancePerCount: fits.variancePerSignal,
    correlated: isCorrelated,
    dark: recording.darkUsed,
  };
  if (isCorrelated) {
    return {
      id: 'noise',
      verdict: 'use with care',
      facts,
      text: `Neighbouring points share their noise over ${String(noise.correlation.length + 1)} points, as after smoothing${fits.correlatedNoise === null ? '' : `; the uncertainties were widened ${plain(fits.correlatedNoise.widening, 2)} times to match`}.`,
      remedy: 'Switch smoothing off in the export and record again.',
    };
  }
  return {
    id: 'noise',
    verdict: 'sound',
    facts,
    text:
      noise.origin === 'bench'
        ? 'The noise follows the gain and read noise of the bench file.'
        : 'The noise was estimated from the recording itself.',
    remedy:
      noise.origin === 'bench' ? '' : 'Give gain and read noise in the bench file for sharper uncertainties.',
  };
}
