import { describeConflicts } from '../conflicts/describe-conflicts'
import { settle } from '../conflicts/find-conflicts'
import { type Estimate, estimate } from '../estimate/estimate'
import { type Equation, equationsOf } from '../estimate/exact-equations'
import { type ExactSpace, exactSpace, isAlwaysZero } from '../estimate/exact-space'
import { type Reading, readingsOf, withoutReadings } from '../estimate/readings'
import { startingPoint } from '../estimate/starting-point'
import { buildModel, type Model } from '../model'
import type { Problem } from '../problem'
import type { Conflict } from '../solution'
import type { Knowledge } from '../states/knowledge'

/** The estimate with all that it rests on, for questions put to it later. */
export type Reconciled = {
  model: Model
  space: ExactSpace
  readings: Reading[]
  equations: Equation[]
  estimate: Estimate
  conflicts: Conflict[]
  /** What the exact rows alone say. */
  knowledge: Knowledge
}

/** Further starts where exact rules are not linear: until one leads to an estimate, and a few to find a better one. */
const MORE = 8
const FEW = 3
/** Sum of squares a reading up to which no other start is tried. */
const PLEASED = 2

/**
 * Makes the estimate: givens with a standard deviation are readings, all else holds exactly (Kuehn and Davidson, Chem.
 * Eng. Prog. 57, 1961). Undefined where the flow unit does not fit the basis. May throw only on a fault of its own.
 */
export function estimateOf(problem: Problem): Reconciled | undefined {
  const model = buildModel(problem)
  if (!model) return undefined
  const settled = settle(withoutReadings(model))
  const { knowledge, left } = settled.resolved
  const equations = equationsOf(model, left)
  const space = exactSpace(knowledge, equations.ratios.length)
  const readings = readingsOf(model)
  const start = startingPoint(model, space, readings, equations)
  // A share of a stream that is exactly empty says nothing.
  const telling = readings.filter(({ measure: { denominator } }) => !denominator || !isAlwaysZero(space, denominator))
  let best = estimate(model, space, telling, equations.list, start)
  // Rules that are not linear may hold in several places: the readings choose, unless the first place pleases them.
  const pleased = (its: Estimate): boolean => its.converged && its.objective <= PLEASED * (telling.length + 1)
  for (
    let attempt = 1;
    !pleased(best) && attempt <= (best.converged ? FEW : MORE) && equations.list.length > 0;
    attempt++
  ) {
    const other = estimate(
      model,
      space,
      telling,
      equations.list,
      startingPoint(model, space, readings, equations, attempt),
    )
    if (other.converged && (!best.converged || other.objective < best.objective)) best = other
  }
  return {
    model,
    space,
    readings: telling,
    equations: equations.list,
    estimate: best,
    conflicts: describeConflicts(model, settled),
    knowledge,
  }
}
