import { hydrogenLine, type HydrogenLine } from '../physics/hydrogen.ts';

/** Upper levels analysed when the bench file names none: H-alpha to H-epsilon. */
export const defaultUpperLevels: readonly number[] = Object.freeze([3, 4, 5, 6, 7]);

/** The Balmer lines of the given upper levels, long wavelengths first, each once. */
export function balmerLines(upperLevels: readonly number[]): readonly HydrogenLine[] {
  return [...new Set(upperLevels)].sort((a, b) => a - b).map((level) => hydrogenLine(level));
}
