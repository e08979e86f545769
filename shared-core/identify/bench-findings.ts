import type { ImpurityFinding } from './describe-claim.ts';
import type { MeasuredEmitter } from './judge-emitter.ts';
import type { UnassignedPeaks } from './unassigned-peaks.ts';

/** What the species found mean together at the bench. */
export interface BenchFinding {
  readonly id: BenchFindingId;
  /** "Air leak". */
  readonly title: string;
  readonly confidence: 'sure' | 'likely';
  readonly evidenceFor: readonly string[];
  readonly evidenceAgainst: readonly string[];
  /** What would settle it: ranges that were not recorded, tests at the bench. */
  readonly wouldSettle: readonly string[];
}

export type BenchFindingId =
  | 'air-leak'
  | 'water'
  | 'oxygen'
  | 'hydrocarbons'
  | 'carbon-oxides'
  | 'mercury'
  | 'electrode-metal'
  | 'glass'
  | 'other-gas'
  | 'molecular-hydrogen';

interface BenchInput {
  readonly claimed: readonly ImpurityFinding[];
  /** Emitters looked for and not claimed. */
  readonly measured: readonly MeasuredEmitter[];
  readonly unassigned: UnassignedPeaks;
}

/** Where to look for a species that was not recorded. */
const mainPlaces: Readonly<Record<string, string>> = Object.freeze({
  N2: 'N2 at 337.1 and 357.7 nm',
  'N2+': 'N2+ at 391.4 nm',
  NH: 'NH at 336.0 nm',
  OH: 'OH at 306 to 309 nm',
  'O I': 'O I at 777.2 to 777.5 nm',
  'Ar I': 'Ar I at 750.4 and 811.5 nm',
  CH: 'CH at 431.4 nm',
  C2: 'C2 at 516.5 nm',
  CN: 'CN at 388.3 nm',
});

/**
 * Reads the species together: N2 with NH, OH, O and Ar is air; OH and O without N2 is water; CH, C2, and CN with nitrogen
 * are oil or other organics. Rules are common practice of the trade.
 * @check test/unit/identify/bench-findings.test.ts
 */
export function benchFindings(input: BenchInput): readonly BenchFinding[] {
  const seen = readerOf(input);
  return [
    airLeak(seen),
    water(seen),
    oxygen(seen),
    hydrocarbons(seen),
    group(
      seen,
      'carbon-oxides',
      'Carbon monoxide or dioxide',
      ['CO'],
      ['C2, CH and CN tell organics from carbon oxides of hot metal or oxide cathodes.'],
    ),
    group(
      seen,
      'mercury',
      'Mercury vapour',
      ['Hg I'],
      [
        'Close off the mercury source (pump, switch, lamp nearby) or cool the tube: the lines must fade.',
        'Switch the tube off and record: lines that stay are room light.',
      ],
    ),
    group(
      seen,
      'electrode-metal',
      'Metal of electrodes',
      ['Al I', 'Cu I', 'Ni I', 'Fe I', 'Cr I', 'W I', 'Mg I'],
      [
        'Record near an electrode and in the middle of the tube: sputtered metal is brightest at the electrode.',
      ],
    ),
    group(
      seen,
      'glass',
      'Hot glass, silica or handling',
      ['Na I', 'K I', 'Li I', 'Ca I', 'Ca II', 'Si I'],
      ['Record at lower current: light from hot glass falls fast with the load.'],
    ),
    otherGas(seen),
    molecularHydrogen(seen),
  ].filter((finding) => finding !== null);
}

interface Reader extends BenchInput {
  readonly claim: (name: string) => ImpurityFinding | undefined;
  readonly isNotSeen: (name: string) => boolean;
  readonly isNotRecorded: (name: string) => boolean;
}

function readerOf(input: BenchInput): Reader {
  const measured = (name: string) =>
    input.measured.find(({ emitter }) => emitter.name === name)?.measurements;
  const claim = (name: string) => input.claimed.find(({ emitter }) => emitter === name);
  return {
    ...input,
    claim,
    isNotSeen: (name) =>
      claim(name) === undefined &&
      measured(name)?.find(({ status }) => status !== 'out-of-range')?.status === 'absent',
    isNotRecorded: (name) =>
      claim(name) === undefined &&
      (measured(name) ?? []).every(({ status }) => status === 'out-of-range' || status === 'hidden'),
  };
}

const evidenceOf = ({ evidence, confidence }: ImpurityFinding): string => `${evidence} (${confidence})`;

const claimsOf = (seen: Reader, names: readonly string[]): ImpurityFinding[] =>
  names.map(seen.claim).filter((found) => found !== undefined);

const unrecorded = (seen: Reader, names: readonly string[]): string[] => {
  const places = names.filter(seen.isNotRecorded).map((name) => mainPlaces[name] ?? name);
  return places.length === 0 ? [] : [`Not recorded, or covered by other light: ${places.join(', ')}.`];
};

function airLeak(seen: Reader): BenchFinding | null {
  const nitrogen = claimsOf(seen, ['N2', 'N2+', 'N I']);
  if (nitrogen.length === 0) return null;
  const company = claimsOf(seen, ['NH', 'OH', 'O I', 'Ar I']);
  const isSure =
    nitrogen.some(({ confidence }) => confidence === 'sure') && nitrogen.length + company.length >= 2;
  const against = ['OH', 'O I']
    .filter(seen.isNotSeen)
    .map((name) => `${mainPlaces[name]!} recorded and not seen, as in dry nitrogen without oxygen.`);
  return {
    id: 'air-leak',
    title: 'Air leak',
    confidence: isSure ? 'sure' : 'likely',
    evidenceFor: [...nitrogen, ...company].map(evidenceOf),
    evidenceAgainst: company.length > 0 && seen.claim('OH') !== undefined ? [] : against,
    wouldSettle: [
      ...unrecorded(seen, ['N2', 'N2+', 'NH', 'OH', 'O I', 'Ar I']),
      'Close the tube off and watch the pressure rise and the nitrogen bands grow. Argon shows only when air is above about 1 % of the fill.',
    ],
  };
}

function water(seen: Reader): BenchFinding | null {
  const oh = seen.claim('OH');
  if (oh === undefined || claimsOf(seen, ['N2', 'N2+']).length > 0) return null;
  const oxygenAtoms = seen.claim('O I');
  return {
    id: 'water',
    title: 'Water vapour',
    confidence: oh.confidence === 'sure' && seen.isNotSeen('N2') ? 'sure' : 'likely',
    evidenceFor: [
      evidenceOf(oh),
      ...(oxygenAtoms === undefined ? [] : [evidenceOf(oxygenAtoms)]),
      ...(seen.isNotSeen('N2') ? ['N2 at 337.1 nm recorded and not seen, so no air.'] : []),
    ],
    evidenceAgainst: seen.isNotSeen('O I') ? ['O I at 777.2 to 777.5 nm recorded and not seen.'] : [],
    wouldSettle: [
      ...unrecorded(seen, ['N2', 'O I']),
      'Bake the tube and run it on fresh gas: the OH bands must fade.',
    ],
  };
}

/** Oxygen without OH and without nitrogen. */
function oxygen(seen: Reader): BenchFinding | null {
  const atoms = seen.claim('O I');
  if (atoms === undefined || claimsOf(seen, ['OH', 'N2', 'N2+']).length > 0) return null;
  return {
    id: 'oxygen',
    title: 'Oxygen: water, oxide or silica',
    confidence: 'likely',
    evidenceFor: [evidenceOf(atoms)],
    evidenceAgainst: ['OH', 'N2']
      .filter(seen.isNotSeen)
      .map((name) => `${mainPlaces[name]!} recorded and not seen.`),
    wouldSettle: [
      ...unrecorded(seen, ['OH', 'N2']),
      'OH tells water from oxygen set free by hot silica or oxides; N2 tells air.',
    ],
  };
}

function hydrocarbons(seen: Reader): BenchFinding | null {
  const carbon = claimsOf(seen, ['CH', 'C2', 'CN', 'C I', 'C II']);
  if (carbon.length === 0) return null;
  const isSure = carbon.some(({ confidence }) => confidence === 'sure') && carbon.length >= 2;
  const hasNitrogen = claimsOf(seen, ['N2', 'N2+', 'CN']).length > 0;
  return {
    id: 'hydrocarbons',
    title: hasNitrogen ? 'Oil or other organics, with nitrogen' : 'Oil or other organics',
    confidence: isSure ? 'sure' : 'likely',
    evidenceFor: carbon.map(evidenceOf),
    evidenceAgainst: ['C2', 'CN']
      .filter(seen.isNotSeen)
      .map((name) => `${mainPlaces[name]!} recorded and not seen.`),
    wouldSettle: [
      ...unrecorded(seen, ['CH', 'C2', 'CN']),
      'Valve off the pump or cool its trap: carbon from pump oil must fade; seals and cleaning residues stay.',
    ],
  };
}

function group(
  seen: Reader,
  id: BenchFindingId,
  title: string,
  names: readonly string[],
  wouldSettle: readonly string[],
): BenchFinding | null {
  const found = claimsOf(seen, names);
  if (found.length === 0) return null;
  return {
    id,
    title,
    confidence: found.some(({ confidence }) => confidence === 'sure') ? 'sure' : 'likely',
    evidenceFor: found.map(evidenceOf),
    evidenceAgainst: [],
    wouldSettle,
  };
}

/** Argon with nitrogen is air and said so there. */
function otherGas(seen: Reader): BenchFinding | null {
  const names = ['He I', 'He II', 'Ne I', 'Kr I', 'Xe I'];
  const isAir = claimsOf(seen, ['N2', 'N2+', 'N I']).length > 0;
  return group(seen, 'other-gas', 'Another fill or reference gas', isAir ? names : [...names, 'Ar I'], [
    'Block the reference lamp: lines that stay come from the tube.',
  ]);
}

/** So many stray peaks between 430 and 500 nm are more than a handful of impurities. */
const manyPeaks = 5;

function molecularHydrogen(seen: Reader): BenchFinding | null {
  const h2 = seen.claim('H2');
  if (h2 === undefined) return null;
  const { count, nearBalmerCount } = seen.unassigned;
  const isCrowded = nearBalmerCount >= manyPeaks;
  return {
    id: 'molecular-hydrogen',
    title: 'Molecular hydrogen',
    confidence: h2.confidence,
    evidenceFor: [
      evidenceOf(h2),
      ...(isCrowded
        ? [
            `${String(nearBalmerCount)} of ${String(count)} unassigned peaks lie between 430 and 500 nm: the many lines of H2 around H-beta and H-gamma.`,
          ]
        : []),
    ],
    evidenceAgainst: [],
    wouldSettle: isCrowded
      ? [
          'A higher current dissociates H2: its lines must fall against the Balmer lines. Watch them for blends under H-beta and H-gamma.',
        ]
      : [],
  };
}
