import type { LinearForm } from '../measure/measure'
import { seededRandom } from '../random'
import type { Assembly } from '../rows/assemble'
import { applyInverse } from '../sparse/solve'
import { evaluate, type Knowledge } from './knowledge'

/** Store row -> relative change of a row that was turned linear for a change of what is typed by all of itself. */
export type Blur = Map<number, number>

/**
 * Changes of all unknowns (two vectors of length nColumns) where every typed value, and every row turned linear by its
 * blur, changes by all of itself with a random sign: what moves much more than itself rests on differences.
 */
export function randomChanges({ rows }: Assembly, { elimination: e, generic }: Knowledge, blur: Blur): Float64Array[] {
  return [1, 2].map((seed) => {
    const random = seededRandom(seed)
    const rhs = Float64Array.from({ length: e.rows.nRows }, (_, i) => {
      const row = e.rows.stored[i] as number
      const typed = rows.typed[row]
      const sign = random() < 0.5 ? -1 : 1
      if (typed) {
        const { denominator } = typed.measure
        return sign * typed.value * (denominator ? evaluate(denominator, generic).value : 1)
      }
      const its = blur.get(row)
      if (its === undefined) return 0
      let most = 0
      for (let k = e.rows.start[i] as number; k < (e.rows.start[i + 1] as number); k++)
        most = Math.max(
          most,
          Math.abs((e.rows.value[k] as number) * (generic.value[e.rows.column[k] as number] as number)),
        )
      return sign * most * its
    })
    return applyInverse(e, rhs)
  })
}

/** Change of a form that is 0 beside its largest term at the generic solution, at least 1: how blurred what rests on it is. */
export function blurOf(forms: readonly LinearForm[], { generic }: Knowledge, changes: readonly Float64Array[]): number {
  let blur = 1
  for (const { columns, coefficients, constant } of forms) {
    const term = (x: Float64Array, k: number): number =>
      (coefficients[k] as number) * (x[columns[k] as number] as number)
    const largest = columns.reduce((most, _, k) => Math.max(most, Math.abs(term(generic.value, k))), Math.abs(constant))
    if (largest === 0) continue
    for (const x of changes)
      blur = Math.max(blur, Math.abs(columns.reduce((sum, _, k) => sum + term(x, k), 0)) / largest)
  }
  return blur
}
