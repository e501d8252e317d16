import { type Settled, settle } from './conflicts/find-conflicts'
import { buildModel, type Model } from './model'
import type { Problem } from './problem'
import type { Solution } from './solution'

export type SettledModel = { model: Model; settled: Settled }

const kept = new WeakMap<Solution, SettledModel>()

/** Keeps what a solution was read from, so that what comes after it in the same thread need not solve again. */
export function keepSettled(solution: Solution, settled: SettledModel): Solution {
  kept.set(solution, settled)
  return solution
}

/** The settled book that a solution was read from; solved again where the solution comes from elsewhere. */
export function settledOf(problem: Problem, solution: Solution): SettledModel | undefined {
  const before = kept.get(solution)
  if (before) return before
  const model = buildModel(problem)
  const settled = model && { model, settled: settle(model) }
  if (settled) kept.set(solution, settled)
  return settled
}
