const greek: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
};

/** The trade's short name of a line: "H-alpha" is "Hα", "H-8" is "H8"; any other id stays as it is. */
export function lineLabel(lineId: string): string {
  const [, atom, rest] = /^([HD])-(alpha|beta|gamma|delta|epsilon|\d+)$/.exec(lineId) ?? [];
  if (atom === undefined || rest === undefined) return lineId;
  return atom + (greek[rest] ?? rest);
}
