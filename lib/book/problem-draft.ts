import type { MeasureName, Problem } from '@/lib/balance/problem'
import type { ComponentId, MeasureId, StreamId } from './ids'
import type { Kind } from './kinds'

/** A record that the solver does not get, and why, as a plain sentence. */
export type LeftOut = { id: string; kind: Kind; what: string }

export type BookProblem = {
  /** Valid: it passes the problem file's own checks. */
  problem: Problem
  /** Stream of each index of `problem.streams`. */
  streams: StreamId[]
  /** Component of each index of `problem.components`. */
  components: ComponentId[]
  leftOut: LeftOut[]
  /** Measures to be answered besides the cells, and the row of each: 'volumeFlow' where a stream has a density. */
  wanted: MeasureName[]
  rows: (MeasureId | 'volumeFlow')[]
}

/** A problem as it is put together, with the record behind each entry, so that a refusal can be traced back. */
export type Draft = {
  problem: Problem & Required<Pick<Problem, 'reactions' | 'parameters' | 'givens' | 'relations'>>
  from: Record<DraftList, string[]>
}
export type DraftList = 'components' | 'streams' | 'units' | 'reactions' | 'parameters' | 'givens' | 'relations'
