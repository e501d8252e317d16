import type { Settled } from '../conflicts/find-conflicts'
import type { Model } from '../model'
import { seededRandom } from '../random'
import { equationsOf, evaluateExpression, overColumns } from '../roots/equations'
import { freeSpace } from '../roots/free-space'
import { leastSquares, type Residuals } from '../roots/least-squares'
import { along } from '../roots/tangent-rows'
import type { Work } from '../roots/work'
import type { Vector } from '../sparse/solve'

/** Above this many free columns the dense work would be felt. */
const MOST_FREE = 120
const STARTS = 24
/** Values are typed as they come out: a worse fit would show as values that do not agree. */
const MET = 1e-15
const STILL_MET = 1e-12
const STEPS = 80
const AT_LIMIT = 1e-7

/**
 * One random solution of all rows and rules with no flow negative: the stand-in for values that nobody has measured yet.
 * Another seed, another solution. undefined where none is found within the work allowed.
 */
export function randomPoint(
  model: Model,
  { resolved, assembly }: Settled,
  seed: number,
  work: Work,
): Vector | undefined {
  const { knowledge, left } = resolved
  const nFree = knowledge.elimination.free.length
  if (nFree === 0 || nFree > MOST_FREE) return undefined
  const space = freeSpace(knowledge, work)
  if (!space) return undefined
  const { directions, size, point } = space
  const flows: { column: number; gradient: Float64Array }[] = []
  for (let column = 0; column < model.nColumns; column++) {
    if (!assembly.nonNegative[column]) continue
    const gradient = Float64Array.from(directions, (h) => (h[column] as number) / (size[column] as number))
    if (gradient.some((value) => value !== 0)) flows.push({ column, gradient })
  }
  const at = (t: Float64Array): Float64Array => {
    const x = Float64Array.from(point)
    for (const [q, h] of directions.entries())
      for (let j = 0; j < x.length; j++) x[j]! += (t[q] as number) * (h[j] as number)
    return x
  }
  const expressions = left.flatMap((item) => equationsOf(model, item))
  const equations = (x: Float64Array): ReturnType<Residuals> => {
    const rest: number[] = []
    const gradient: Float64Array[] = []
    for (const expression of expressions) {
      const { value, terms, gradient: form } = evaluateExpression(expression, overColumns(x))
      if (!Number.isFinite(value) || !form.coefficients.every(Number.isFinite)) return undefined
      const by = terms || 1
      rest.push(value / by)
      gradient.push(along(form, directions).map((change) => change / by))
    }
    return { rest, gradient }
  }
  const random = seededRandom(seed)
  for (let start = 0; start < STARTS; start++) {
    if (!work.take(STEPS * nFree * (nFree * flows.length + model.nColumns))) return undefined
    // A flow that would be negative comes to a size of its own, so that no two are equal by the method.
    const floor = flows.map(({ column }) => (size[column] as number) * 0.1 ** (1 + (start % 4)) * (0.2 + random()))
    const signs = (x: Float64Array, sofar: NonNullable<ReturnType<Residuals>>, high: number) => {
      flows.forEach(({ column, gradient }, k) => {
        const under = ((x[column] as number) - high * (floor[k] as number)) / (size[column] as number)
        if (under >= 0) return
        sofar.rest.push(under)
        sofar.gradient.push(gradient)
      })
      return sofar
    }
    const spread = 1 + 3 * random()
    const from = Float64Array.from(directions, () => spread * (random() - 0.25))
    const inside = leastSquares((t) => signs(at(t), { rest: [], gradient: [] }, 1), from, 0)
    if (!inside) continue
    const both = leastSquares(
      (t) => {
        const x = at(t)
        const sofar = equations(x)
        return sofar && signs(x, sofar, 0.05)
      },
      inside.t,
      MET,
    )
    const fine = both && leastSquares((t) => equations(at(t)), both.t, MET)
    if (!fine || fine.worst > STILL_MET) continue
    const x = at(fine.t)
    // A flow at its limit would stand for one that is 0, near which more holds than in general.
    if (flows.some(({ column }) => (x[column] as number) < AT_LIMIT * (size[column] as number))) continue
    return { value: x, size: x.map((value, j) => Math.max(Math.abs(value), knowledge.particular.size[j] as number)) }
  }
  return undefined
}
