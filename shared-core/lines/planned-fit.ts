import type { Additions } from './additions.ts';
import type { SolvedFit } from './solved-fit.ts';

/** A solved fit with what it holds beyond the Balmer lines. */
export interface PlannedFit {
  readonly fit: SolvedFit;
  readonly additions: Additions;
}
