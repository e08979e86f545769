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

/** How an iteration begins and when it ends. */
export interface IterationRule {
  /** Damping of the first step: 0 where the start is good, 1 and more where a full step may land anywhere. */
  readonly firstDamping: number;
  /** Damping below this is dropped; the more digits the engine's equations keep, the lower it may be. */
  readonly leastDamping: number;
  /** Whether a step that should gain this much is the last one of its round. */
  readonly isLast: (promised: number, round: number) => boolean;
  /** The least change of the objective that means anything: at the current point, rounding makes smaller ones. */
  readonly resolution: () => number;
  /** Whether weights renewed once more would not move anything, given what the last renewal gained. */
  readonly isSettled: (gained: number, round: number) => boolean;
  readonly maxRounds: number;
  /** Points tried and weights renewed. */
  readonly maxEvaluations: number;
}

export interface IterationOutcome {
  readonly status: FitStatus;
  /** Sum of the gains of the steps that were checked. */
  readonly gained: number;
  readonly evaluationCount: number;
}

/** Equations that even this much damping does not make solvable hold no information. */
const singularDamping = 1e6;
/** A step this short that still makes things worse means that gradient and objective disagree. */
const stalledDamping = 1e20;
/** Steps in a row that the objective cannot tell apart before it counts as standing still. */
const mostUntold = 20;
/** Longest step tried, in steps of the linearised problem. */
const longestStep = 8;

/**
 * Iterates to the lowest objective, renews the weights from the model found, and so on until renewed weights move nothing:
 * this solves sum (y - m)/V(m) dm = 0 (quasi-likelihood), free of the bias that weights from noisy data bring.
 *
 * @source [Wedderburn1974] for the reweighting
 * @check  test/unit/numeric/damped-iteration.test.ts, test/property/joint-fit.test.ts
 */
export function minimise(engine: DampedEngine, rule: IterationRule): IterationOutcome {
  let evaluationCount = 0;
  for (let round = 0; ; round++) {
    const outcome = iterateDamped(engine, rule, round, rule.maxEvaluations - evaluationCount);
    evaluationCount += outcome.evaluationCount;
    if (outcome.status !== 'converged' || rule.isSettled(outcome.gained, round))
      return { ...outcome, evaluationCount };
    if (round + 1 >= rule.maxRounds) return { ...outcome, status: 'iteration-limit', evaluationCount };
    engine.reweigh();
    evaluationCount++;
  }
}

/**
 * The iteration that every least-squares fit of the program uses, at the weights the engine has.
 *
 * Gauss-Newton steps; Marquardt damping when one makes things worse or has no unique solution, raised ever faster
 * while steps fail and lowered by how well the last gain was foretold; longer steps where undamped ones prove too
 * short; done when an undamped step promises no gain.
 *
 * @source damping [Marquardt1963], its control [Nielsen1999]; step lengths from the parabola through value, slope and
 *         gain: common practice
 */
function iterateDamped(
  engine: DampedEngine,
  rule: IterationRule,
  round: number,
  maxEvaluations: number,
): IterationOutcome {
  // Later rounds begin where the last one ended, which is a good start.
  let damping = round === 0 ? rule.firstDamping : 0;
  let growth = 2;
  let length = 1;
  let gained = 0;
  let evaluationCount = 0;
  let untold = 0;
  const ended = (status: FitStatus): IterationOutcome => ({ status, gained, evaluationCount });
  const raiseDamping = (): void => {
    if (damping === 0) {
      damping = 10 * rule.leastDamping;
      return;
    }
    damping *= growth;
    growth *= 2;
  };

  /** Steps no longer change the objective: as good as it gets, unless the equations promise a gain that one would see. */
  function standingStill(): IterationOutcome {
    const promised = engine.findStep(0);
    if (promised === null) return ended('singular');
    if (promised > rule.resolution()) return ended('stalled');
    engine.finish();
    return ended('converged');
  }

  while (evaluationCount < maxEvaluations) {
    const promised = engine.findStep(damping);
    if (promised === null) {
      if (damping > singularDamping) return ended('singular');
      raiseDamping();
      continue;
    }
    if (rule.isLast(promised, round)) {
      const undamped = damping === 0 ? promised : engine.findStep(0);
      // Nothing left to gain, but the equations do not say where all parameters lie.
      if (undamped === null) return ended('singular');
      if (rule.isLast(undamped, round)) {
        // Too small to be worth checking: taken as it is.
        engine.finish();
        return ended('converged');
      }
      if (damping > 0) engine.findStep(damping);
    }
    const isHeld = engine.tryStep(length);
    evaluationCount++;
    const gain = engine.gain();
    if (!(gain >= -rule.resolution())) {
      length = 1;
      raiseDamping();
      if (damping > stalledDamping) return ended('stalled');
      continue;
    }
    const isTold = gain > rule.resolution();
    engine.accept();
    gained += gain;
    untold = isTold ? 0 : untold + 1;
    if (untold > mostUntold) return standingStill();
    growth = 2;
    damping *= dampingFactor(promised > 0 ? gain / promised : 0);
    if (damping < rule.leastDamping) damping = 0;
    length = isTold && damping === 0 && !isHeld ? betterLength(length, promised, gain) : 1;
  }
  return ended('iteration-limit');
}

/** From 0.1 where a step gained all it promised, over 1 at half of that, to 2 where it gained nothing. */
function dampingFactor(share: number): number {
  const surplus = 2 * share - 1;
  return Math.min(2, Math.max(0.1, 1 - surplus * surplus * surplus));
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
