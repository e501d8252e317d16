import { deviationOf, type Estimate } from '../estimate/estimate'
import { type ExactSpace, gradientOf } from '../estimate/exact-space'
import type { Reading } from '../estimate/readings'

/** Below this part of its variance a reading keeps no room for an adjustment: nothing checks it. */
const UNCHECKED = 1e-9
/** Standardised adjustments this close, of adjustments that always move together, are one group. */
const ALIKE = 1e-6

/** What the estimate says of each reading. */
export type ReadingTest = {
  /** Part of the reading's variance that its adjustment has: 0 where nothing checks it. */
  free: number
  /** Standardised adjustment, signed; undefined where nothing checks it. */
  standardised: number | undefined
  /** Row of Q: how the estimate of this reading rests on all readings, length rank. */
  row: Float64Array
}

/** Measurement test of each reading (Mah and Tamhane, AIChE J. 28, 1982): adjustment over its own deviation. */
export function testReadings(space: ExactSpace, readings: readonly Reading[], est: Estimate): ReadingTest[] {
  return readings.map(({ measure, sigma }, i) => {
    const { a } = deviationOf(est, gradientOf(space, measure, est.x, 1 / sigma))
    const leverage = a.reduce((sum, value) => sum + value * value, 0)
    const free = Math.max(1 - leverage, 0)
    const isChecked = free > UNCHECKED
    return {
      free: isChecked ? free : 0,
      standardised: isChecked ? (est.residual[i] as number) / Math.sqrt(free) : undefined,
      row: a,
    }
  })
}

/** Numbers from 1 for readings that cannot be told apart, by the order of `order` (indexes of checked readings). */
export function groupsOf(tests: readonly ReadingTest[], order: readonly number[]): Map<number, number> {
  const group = new Map<number, number>()
  let next = 0
  for (const i of order) {
    if (group.has(i)) continue
    group.set(i, ++next)
    const its = tests[i] as ReadingTest
    for (const j of order) {
      const other = tests[j] as ReadingTest
      if (group.has(j)) continue
      const gap = Math.abs(Math.abs(its.standardised as number) - Math.abs(other.standardised as number))
      if (gap > ALIKE * Math.max(1, Math.abs(its.standardised as number))) continue
      const together = its.row.reduce((sum, value, k) => sum + value * (other.row[k] as number), 0)
      if (Math.abs(together) / Math.sqrt(its.free * other.free) > 1 - ALIKE) group.set(j, next)
    }
  }
  return group
}
