const greek: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
};

const shortNames: Readonly<Record<string, string>> = { Lyman: 'Ly', Paschen: 'Pa', Brackett: 'Br' };

/** The trade's short name of a line: "H-alpha" is "Hα", "H-8" is "H8", "Paschen-beta" "Paβ"; any other id stays as it is. */
export function lineLabel(lineId: string): string {
  const [, series, member] =
    /^(H|D|(?:D )?(?:Lyman|Paschen|Brackett))-(alpha|beta|gamma|delta|epsilon|\d+)$/.exec(lineId) ?? [];
  if (series === undefined || member === undefined) return lineId;
  return series.replace(/Lyman|Paschen|Brackett/, (name) => shortNames[name]!) + (greek[member] ?? member);
}
