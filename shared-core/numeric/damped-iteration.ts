/** How a fit ended; only the values of a converged one may be used. */
export type FitStatus =
  | 'converged'
  /** No step lowers the objective, however short, though the equations promise that one should. */
  | 'stalled'
  | 'iteration-limit'
  /** The data do not determine all parameters. */
  | 'singular';

/** A least-squares problem at its current point, as the iteration sees it. The objective is a sum of squares. */
export interface DampedEngine {
  /**
   * Solves the linearised problem, the diagonal of its scaled normal matrix raised by 1 + damping.
   * Returns step times half gradient (half the slope at which the objective falls at the start of the step; all of the
   * gain to be had when damping is zero), or null when the equations have no unique solution.
   */
  findStep(damping: number): number | null;
  /** Goes `length` steps from the current point as far as the bounds let it, and evaluates there; says whether they held it. */
  tryStep(length: number): boolean;
  /** Objective at the current point less that at the point tried; not a number where there is none. */
  gain(): number;
  /** Makes the point last tried the current one. */
  accept(): void;
  /** Takes one step without evaluating. */
  finish(): void;
  /** Renews the weights from the model at the current point, and evaluates there again. */
  reweigh(): void;
}

export interface StopRule {
  /** Whether a step that should gain this much is the last one of its round. */
  readonly isLast: (promised: number, round: number) => boolean;
  /** Whether the objective got worse by more than rounding can explain. */
  readonly isWorse: (gain: number) => boolean;
  /** Whether weights renewed once more would not move anything, given what the last renewal gained. */
  readonly isSettled: (gained: number, round: number) => boolean;
  readonly maxRounds: number;
  readonly maxEvaluations: number;
}

export interface IterationOutcome {
  readonly status: FitStatus;
  /** Sum of the gains of the steps that were checked. */
  readonly gained: number;
  readonly evaluationCount: number;
}

const firstDamping = 1e-3;
/** Below this a step is a Gauss-Newton step in all but name, and damping is dropped. */
const leastDamping = 1e-4;
/** Equations that even this much damping does not make solvable hold no information. */
const singularDamping = 1e6;
/** A step this short that still makes things worse means that gradient and objective disagree. */
const stalledDamping = 1e8;
/** Longest step tried, in steps of the linearised problem. */
const longestStep = 8;

/**
 * The iteration that every least-squares fit of the program uses, at the weights the engine has.
 *
 * Gauss-Newton steps; Marquardt damping when one makes things worse or has no unique solution; longer steps where they
 * prove too short; done when an undamped step promises no gain.
 *
 * @source [Marquardt1963] for the damping; step lengths from the parabola through value, slope and gain, common practice
 * @check  test/unit/numeric/damped-iteration.test.ts, test/reference/strd-nonlinear.test.ts
 */
function iterateDamped(
  engine: DampedEngine,
  stop: StopRule,
  round: number,
  maxEvaluations: number,
): IterationOutcome {
  let damping = 0;
  let length = 1;
  let gained = 0;
  let evaluationCount = 0;
  let isDetermined = true;
  const ended = (status: FitStatus): IterationOutcome => ({ status, gained, evaluationCount });
  const raise = (): number => (damping === 0 ? firstDamping : damping * 10);

  while (evaluationCount < maxEvaluations) {
    const promised = engine.findStep(damping);
    if (promised === null) {
      if (damping > singularDamping) return ended('singular');
      if (damping === 0) isDetermined = false;
      damping = raise();
      continue;
    }
    if (damping === 0) isDetermined = true;
    if (stop.isLast(promised, round)) {
      // Nothing more to gain, but the equations at this point do not say where all parameters lie.
      if (!isDetermined) return ended('singular');
      if (damping === 0) {
        // Too small to be worth checking: taken as it is.
        engine.finish();
        return ended('converged');
      }
    }
    const isHeld = engine.tryStep(length);
    evaluationCount++;
    const gain = engine.gain();
    if (Number.isNaN(gain) || stop.isWorse(gain)) {
      length = 1;
      damping = raise();
      if (damping > stalledDamping) return ended('stalled');
      continue;
    }
    engine.accept();
    gained += gain;
    length = isHeld ? 1 : betterLength(length, promised, gain);
    damping = damping < leastDamping ? 0 : damping * 0.1;
  }
  return ended('iteration-limit');
}

/**
 * Iterates to the lowest objective, renews the weights from the model found, and so on until renewed weights move nothing:
 * this solves sum (y - m)/V(m) dm = 0 (quasi-likelihood), free of the bias that weights from noisy data bring.
 *
 * @param stop  with one round the weights stay as they are
 * @source [Wedderburn1974] for the reweighting
 * @check  test/unit/numeric/damped-iteration.test.ts, test/property/joint-fit.test.ts
 */
export function minimise(engine: DampedEngine, stop: StopRule): IterationOutcome {
  let evaluationCount = 0;
  for (let round = 0; ; round++) {
    const outcome = iterateDamped(engine, stop, round, stop.maxEvaluations - evaluationCount);
    evaluationCount += outcome.evaluationCount;
    const isLastRound = stop.isSettled(outcome.gained, round) || round + 1 >= stop.maxRounds;
    if (outcome.status !== 'converged' || isLastRound) return { ...outcome, evaluationCount };
    engine.reweigh();
    evaluationCount++;
  }
}

/**
 * Length at which the next step is tried. Along a step the objective is a parabola with slope -2 promised at its
 * start; one gain fixes it and so its lowest point. Large residuals make Gauss-Newton steps too short, often by the
 * same factor again and again; this finds the factor. For a good model the answer is 1.
 */
function betterLength(length: number, promised: number, gain: number): number {
  const bend = 2 * promised * length - gain;
  if (!(bend > 0)) return 4;
  const best = (promised * length * length) / bend;
  return best > 1.3 ? Math.min(longestStep, best) : 1;
}
