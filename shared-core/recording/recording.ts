import type { Note } from '../result/result.ts';

export type { InputFile } from '../result/input-file.ts';

export type WavelengthUnit = 'nm' | 'angstrom' | 'um' | 'cm-1';

/** What the reader made of a text table, in facts; shown to the user beside the data. */
export interface Understood {
  readonly encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'latin-1';
  readonly delimiter: 'comma' | 'semicolon' | 'tab' | 'blanks';
  readonly decimalMark: 'point' | 'comma';
  /** Lines before the first data row. */
  readonly headerLineCount: number;
  readonly columnCount: number;
  /** 1-based column of the axis; null when the file holds signal only. */
  readonly axisColumn: number | null;
  /** 1-based column of the signal. */
  readonly signalColumn: number;
  readonly axisUnit: WavelengthUnit | 'pixel';
  /** How the unit was found: from a header cell, or from the range of the numbers. */
  readonly axisUnitFrom: 'header' | 'range' | 'bench';
  readonly order: 'ascending' | 'descending';
  readonly skippedRowCount: number;
}

/**
 * A recording as it came from the spectrometer, in ascending wavelength.
 * Invariants (checked by the only constructor, `makeRecording`): both arrays have the same length (at
 * least 8), all values are finite, wavelengthNm increases strictly.
 */
export interface Recording {
  readonly name: string;
  readonly sha256: string;
  /** nm, pixel centres, in `medium`; as recorded, before any registration. */
  readonly wavelengthNm: Float64Array;
  /** Recorded signal, counts (or whatever the file holds), dark not yet removed. */
  readonly signal: Float64Array;
  readonly medium: 'air' | 'vacuum';
  readonly understood: Understood;
  readonly notes: readonly Note[];
}

/** Relative spectral response of the spectrometer, one row a wavelength. */
export interface ResponseTable {
  readonly name: string;
  readonly sha256: string;
  /** nm, strictly increasing. */
  readonly wavelengthNm: Float64Array;
  /** Relative, > 0: counts per photon or per unit of energy, as the bench says. */
  readonly response: Float64Array;
  /** Relative standard uncertainty of each point (1 sigma); null when the table gives none. */
  readonly relativeSigma: Float64Array | null;
}
