/** Sizes a recording, dark or response table may have; hosts check the byte size before they read a file. */
export const recordingLimits = Object.freeze({
  /** 64 MiB: some hundred times the longest recording of a bench spectrometer. */
  maximumByteCount: 64 * 1024 * 1024,
  maximumRowCount: 2_000_000,
  /** A recording with fewer points cannot hold one line and its background. */
  minimumRowCount: 8,
  /** A response table is interpolated between its rows. */
  minimumResponseRowCount: 2,
  /** nm; optical spectrometers with lamps of this kind record well inside this. */
  shortestNm: 100,
  longestNm: 3000,
});
