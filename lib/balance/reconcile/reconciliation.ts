import type { Conflict, Place } from '../solution'

/** How a measure stands: whether readings check it, only give it, reach it, or it holds exactly. */
export type MeasureClass = 'redundant' | 'justDetermined' | 'observable' | 'unobservable' | 'exact'

export type ReconciledMeasure = Place & {
  class: MeasureClass
  /** Flows in the book's units, fractions of 1, as all that follows. */
  reading?: number
  /** Of the reading, as typed. */
  sigma?: number
  value?: number
  /** Reading less value. */
  adjustment?: number
  /** Adjustment over its own standard deviation; null where nothing checks the reading. */
  standardised?: number | null
  /** Of the value. */
  standardDeviation?: number
}

export type Suspect = Place & {
  standardised: number
  /** Sum of squares when the estimate is made without this reading. */
  objectiveWithout: number
  criticalWithout: number | null
  /** What the others say that this reading should be. */
  estimate: number
  /** Readings of one number cannot be told apart. */
  group: number
}

/** The result `tallybrook-reconciliation/1`. */
export type Reconciliation = {
  format: 'tallybrook-reconciliation/1'
  name: string
  summary: {
    readings: number
    redundancy: number
    objective: number
    level: number
    critical: number | null
    agrees: boolean | null
    measurementCritical: number | null
    iterations: number
    boundsActive: number
    approximate: boolean
  }
  measures: ReconciledMeasure[]
  units: { unit: string; imbalance: number; standardised: number }[]
  /** Best first: without the first the rest hangs together best. */
  suspects: Suspect[]
  conflicts: Conflict[]
  status: 'reconciled' | 'atOdds' | 'gaveUp'
}
