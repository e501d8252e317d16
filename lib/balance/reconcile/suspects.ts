import { estimate } from '../estimate/estimate'
import { measureAt, type Reading } from '../estimate/readings'
import { placeOf } from './measures'
import { chiSquareAbove } from './quantiles'
import type { Reconciled } from './reconciled'
import type { Suspect } from './reconciliation'
import { groupsOf, type ReadingTest } from './test-readings'

/** Work (readings x places squared) that may be spent on estimates anew; beyond, the linear answer stands. */
const MOST_WORK = 3e9

/**
 * Each checked reading left out in turn (serial elimination; Serth and Heenan, AIChE J. 32, 1986): the sum of squares
 * of the rest and what the rest says of it, best first. Those that could matter most are estimated anew, starting from
 * the whole estimate; where that would take too long the last ones by the linear formulas, exact to first order.
 */
export function findSuspects(
  made: Reconciled,
  tests: readonly ReadingTest[],
  redundancy: number,
  level: number,
  onProgress?: (part: number) => boolean,
): Suspect[] {
  const { model, space, readings, equations, estimate: est } = made
  const order = [...tests.keys()]
    .filter((i) => (tests[i] as ReadingTest).free > 0)
    .sort((a, b) => Math.abs(standardised(tests, b)) - Math.abs(standardised(tests, a)) || a - b)
  const groups = groupsOf(tests, order)
  const critical = redundancy > 1 ? chiSquareAbove(1 - level, redundancy - 1) : null
  const each = 3 * readings.length * Math.max(est.qr.n, 1) * Math.max(est.qr.rank, 1)
  const anew = Math.max(1, Math.floor(MOST_WORK / each))
  const suspects: Suspect[] = []
  for (const [rank, i] of order.entries()) {
    const reading = readings[i] as Reading
    const { free, standardised: z = 0 } = tests[i] as ReadingTest
    let objective = Math.max(est.objective - z * z, 0)
    let value = reading.value - ((est.residual[i] as number) / free) * reading.sigma
    if (rank < anew) {
      const again = estimate(
        model,
        space,
        readings.filter((_, k) => k !== i),
        equations,
        est.x,
      )
      if (again.converged) {
        objective = again.objective
        value = measureAt(reading.measure, again.x)
      }
    }
    suspects.push({
      ...placeOf(reading),
      standardised: z,
      objectiveWithout: redundancy > 1 ? objective : 0,
      criticalWithout: critical,
      estimate: value,
      group: groups.get(i) as number,
    })
    if (onProgress && !onProgress((rank + 1) / order.length)) break
  }
  return suspects.sort((a, b) => a.objectiveWithout - b.objectiveWithout)
}

const standardised = (tests: readonly ReadingTest[], i: number): number => (tests[i] as ReadingTest).standardised ?? 0
