/** Counts (or signal units times pixels), and their standard deviation. */
export interface Reading {
  area: number;
  sigma: number;
}
