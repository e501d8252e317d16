import type { Problem } from '../problem'
import { reconciledMeasures } from './measures'
import { chiSquareAbove, sidakLimit } from './quantiles'
import { estimateOf, type Reconciled } from './reconciled'
import type { Reconciliation } from './reconciliation'
import { findSuspects } from './suspects'
import { testReadings } from './test-readings'
import { testUnits } from './test-units'

export type ReconcileOptions = {
  /** Level of the tests, between 0 and 1; 0.95 when left out. */
  level?: number
  /** Told the part done of the slow half (0 to 1); answers true to go on, false to stop with the suspects found so far. */
  onProgress?: (part: number) => boolean
}

/** Reconciles the readings of a checked problem. Never throws for what a person typed: `gaveUp` says that it failed. */
export function reconcile(problem: Problem, { level = 0.95, onProgress }: ReconcileOptions = {}): Reconciliation {
  let made: Reconciled | undefined
  try {
    made = estimateOf(problem)
  } catch {
    made = undefined
  }
  const answer = (rest: Partial<Reconciliation>, summary: Partial<Reconciliation['summary']>): Reconciliation => ({
    format: 'tallybrook-reconciliation/1',
    name: problem.name,
    summary: {
      readings: made?.readings.length ?? 0,
      redundancy: 0,
      objective: 0,
      level,
      critical: null,
      agrees: null,
      measurementCritical: null,
      iterations: made?.estimate.iterations ?? 0,
      boundsActive: made?.estimate.boundsActive ?? 0,
      approximate: false,
      ...summary,
    },
    measures: [],
    units: [],
    suspects: [],
    conflicts: made?.conflicts ?? [],
    status: 'gaveUp',
    ...rest,
  })
  if (!made) return answer({}, {})
  if (made.conflicts.length > 0) return answer({ status: 'atOdds' }, {})
  const { model, space, readings, knowledge } = made
  const est = made.estimate
  if (!est.converged) return answer({}, {})
  const tests = testReadings(space, readings, est)
  const redundancy = readings.length - est.qr.rank
  const checked = tests.filter(({ free }) => free > 0).length
  const critical = redundancy > 0 ? chiSquareAbove(1 - level, redundancy) : null
  return answer(
    {
      measures: reconciledMeasures(model, space, readings, est, tests),
      units: testUnits(model, knowledge, readings),
      suspects: findSuspects(made, tests, redundancy, level, onProgress),
      status: 'reconciled',
    },
    {
      redundancy,
      objective: redundancy > 0 ? est.objective : 0,
      critical,
      agrees: critical === null ? null : est.objective <= critical,
      measurementCritical: checked > 0 ? sidakLimit(level, checked) : null,
      approximate: est.boundsActive > 0,
    },
  )
}
