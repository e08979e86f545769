/** Resident memory over many diagnoses in one process: how much it grows after the first thousand. */
export function memoryGrowth(diagnoseOnce: (index: number) => void, count: number): string {
  const megabytes = (): number => process.memoryUsage().rss / 2 ** 20;
  const settle = (): void => globalThis.gc?.();
  const warmUp = Math.min(1000, count / 10);
  for (let index = 0; index < warmUp; index++) diagnoseOnce(index);
  settle();
  const before = megabytes();
  let most = before;
  for (let index = warmUp; index < count; index++) {
    diagnoseOnce(index);
    if (index % 100 === 0) most = Math.max(most, megabytes());
  }
  settle();
  const grown = megabytes() - before;
  return `memory over ${String(count)} diagnoses: ${before.toFixed(0)} MB after the first ${String(warmUp)}, at most ${most.toFixed(0)} MB, ${grown >= 0 ? '+' : ''}${grown.toFixed(1)} MB at the end`;
}
