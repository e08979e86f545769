/** A share with its binomial error; below what limit (95 %) where nothing was counted. */
export function rate(part: number, whole: number): string {
  // With none in n the rate is below 3/n at 95 %.
  if (part === 0) return `below ${((100 * 3) / whole).toFixed(1)} %`;
  const share = part / whole;
  return `${(100 * share).toFixed(1)} +- ${(100 * Math.sqrt((share * (1 - share)) / whole)).toFixed(1)} %`;
}
