import { describeConflicts } from '../conflicts/describe-conflicts'
import { settle } from '../conflicts/find-conflicts'
import { buildModel, type Model } from '../model'
import type { Problem } from '../problem'
import type { Conflict } from '../solution'
import type { Knowledge } from '../states/knowledge'
import { type Estimate, estimate } from './estimate'
import { type Equation, equationsOf } from './exact-equations'
import { type ExactSpace, exactSpace } from './exact-space'
import { measureAt, type Reading, readingsOf, withoutReadings } from './readings'
import { startingPoint } from './starting-point'

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

/**
 * Makes the estimate: givens with a standard deviation are readings, all else holds exactly (Kuehn and Davidson, Chem.
 * Eng. Prog. 57, 1961). Undefined where the flow unit does not fit the basis. May throw only on a fault of its own.
 */
export function estimateOf(problem: Problem): Reconciled | undefined {
  const model = buildModel(problem)
  if (!model) return undefined
  const settled = settle(withoutReadings(model))
  const { knowledge, left } = settled.resolved
  const space = exactSpace(knowledge)
  const readings = readingsOf(model)
  const equations = equationsOf(model, left)
  const start = startingPoint(model, space, readings)
  // A share of a stream that is exactly empty says nothing.
  const telling = readings.filter(({ measure }) => !Number.isNaN(measureAt(measure, start)))
  return {
    model,
    space,
    readings: telling,
    equations,
    estimate: estimate(model, space, telling, equations, start),
    conflicts: describeConflicts(model, settled),
    knowledge,
  }
}
