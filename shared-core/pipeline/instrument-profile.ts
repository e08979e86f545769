import type { Bench } from '../bench/bench.ts';
import type { InstrumentTerm } from '../instrument/instrument-term.ts';
import { measureProfile, type MeasuredProfile, type WhyNoProfile } from '../instrument/measure-profile.ts';
import { correctRecording } from '../noise/correct-recording.ts';
import type { Recording } from '../recording/recording.ts';

export interface KnownInstrument {
  /** With the measured width and share in place of the stated ones. */
  readonly bench: Bench;
  readonly profile: MeasuredProfile | WhyNoProfile | null;
  /** Null for what the bench file can say. */
  readonly instrumentTerms: readonly InstrumentTerm[] | null;
}

/** Measures the instrument where a reference lamp was recorded; what it shows stands above what the bench file states. */
export function withMeasuredProfile(input: {
  readonly bench: Bench;
  readonly dark: Recording | null;
  readonly profile?: Recording | null;
}): KnownInstrument {
  const { bench, dark, profile: lamp } = input;
  if (lamp === null || lamp === undefined) return { bench, profile: null, instrumentTerms: null };
  const usableDark = dark !== null && dark.signal.length === lamp.signal.length ? dark : null;
  const corrected = correctRecording(lamp, usableDark, bench);
  const profile = corrected.ok ? measureProfile(corrected.value) : 'no-lines';
  if (typeof profile === 'string') return { bench, profile, instrumentTerms: null };
  const { fwhmNm, fwhmSigmaNm, lorentzShare, shape, terms } = profile;
  return {
    bench: {
      ...bench,
      instrument: { ...bench.instrument, fwhmNm, fwhmSigmaNm, lorentzShare: lorentzShare ?? 0 },
    },
    profile,
    instrumentTerms: shape === 'tabulated' ? terms : null,
  };
}
