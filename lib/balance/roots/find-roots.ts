import type { Settled } from '../conflicts/find-conflicts'
import type { Measure } from '../measure/measure'
import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { type Knowledge, knownMeasure } from '../states/knowledge'
import { type Branch, findBranches } from './branches'
import { findTangents, linearisedAt } from './tangents'
import { Work } from './work'

/** Operations that one book may cost here. */
const BUDGET = 1.5e9
/** Values of one cell in two ways are the same up to this part. */
const SAME = 1e-9

/** What the rules that are not linear say, beyond what could be turned into linear rows. */
export type Roots = {
  /** What is known for sure: the one way in which the rules can be met, else what the linear rows say. */
  sure: Settled
  /** Each way in which the rules that hang on one scalar can be met: there are no others. */
  branches: Knowledge[]
  /** Solutions of all rules, come upon by a search; others may exist. */
  solutions: Knowledge[]
  /** Rows at a solution at which ranks can be told. */
  counted?: Settled
  /** Rows near one way of meeting all rules, for telling how sensitive values are. */
  near?: Settled
  /** The one way is where two come together: what hangs on it is known to half the digits. */
  touches: boolean
  /** Rules that were not, or not fully, used. */
  left: Pending[]
  several: Pending[]
  none: Pending[]
  /** Some work was left undone. */
  stopped: boolean
}

/**
 * Seeks all solutions of the rules that `settle` left: those on one scalar by isolating every value of it, the others by
 * least squares from several starts. undefined, at no cost, where nothing is left.
 */
export function findRoots(model: Model, settled: Settled): Roots | undefined {
  const { resolved, assembly } = settled
  if (resolved.left.length === 0) return undefined
  const work = new Work(BUDGET)
  const start: Branch = { assembly, resolved, touches: false }
  const { leaves, several, none } = findBranches(model, start, work)
  const settledAs = (branch: Branch): Settled => ({
    ...settled,
    assembly: branch.assembly,
    resolved: branch.resolved,
  })
  const found = leaves.map((leaf) => ({ leaf, ...findTangents(model, leaf, work) }))
  const [first, ...others] = found
  const x = first?.tangents[0]?.x ?? (first?.leaf.resolved.left.length === 0 ? first.counted?.x : undefined)
  const near = x && linearisedAt(model, start, x, work)
  const tangents = found.flatMap((its) => its.tangents)
  return {
    sure: first && others.length === 0 ? settledAs(first.leaf) : settled,
    branches: leaves.map((leaf) => leaf.resolved.knowledge),
    // A branch in which no solution came up may still hold one: what its rows leave open stays open.
    solutions:
      tangents.length === 0
        ? []
        : found.flatMap((its) =>
            its.tangents.length === 0
              ? [its.leaf.resolved.knowledge]
              : its.tangents.map(({ branch }) => branch.resolved.knowledge),
          ),
    ...(first?.counted && { counted: settledAs(first.counted.branch) }),
    ...(near && { near: settledAs(near) }),
    touches: leaves.some(({ touches }) => touches),
    left: [...new Set(found.flatMap(({ unused, free }) => [...unused, ...free]))],
    several: [...several],
    none: [...none],
    stopped: work.spent,
  }
}

/** A measure's value where all of these say the same; undefined where there are none. */
export function knownInAll(ways: readonly Knowledge[], measure: Measure): number | undefined {
  let value: number | undefined
  for (const knowledge of ways) {
    const its = knownMeasure(knowledge, measure)
    if (its === undefined) return undefined
    if (value !== undefined && Math.abs(its - value) > SAME * Math.max(Math.abs(its), Math.abs(value))) return undefined
    value ??= its
  }
  return value
}
