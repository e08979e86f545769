/**
 * The one door to elementary functions that give the same last digit in every browser, Node version and processor.
 * They use IEEE 754 basic operations alone; the engine's own functions differ between versions in the last place.
 */
export { exp, log, log10, pow } from './portable-exponential.ts';
export { atan, cos, sin } from './portable-trigonometry.ts';
export { erf, erfc } from './error-function.ts';
