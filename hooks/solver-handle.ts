import type { Solution } from '@/lib/balance/solution'
import type { ComponentId, MeasureId, StreamId } from '@/lib/book/ids'

/** An answer with the order of streams and components that its flat arrays use. */
export type SolvedCase = {
  solution: Solution
  streams: readonly StreamId[]
  components: readonly ComponentId[]
  streamIndex: ReadonlyMap<StreamId, number>
  componentIndex: ReadonlyMap<ComponentId, number>
  /** Where in `solution.wanted` a row that people added stands, or 'volumeFlow'. */
  rowIndex: ReadonlyMap<MeasureId | 'volumeFlow', number>
  /** Records that the solver could not take, with the reason. */
  leftOut: readonly { id: string; kind: string; what: string }[]
}

/** An answer as it comes, with its orders as look-ups. */
export function solvedCase({
  solution,
  streams,
  components,
  rows,
  leftOut,
}: Pick<SolvedCase, 'solution' | 'streams' | 'components' | 'leftOut'> & { rows: readonly string[] }): SolvedCase {
  const places = (ids: readonly string[]) => new Map(ids.map((id, index) => [id, index]))
  return {
    solution,
    streams,
    components,
    leftOut,
    streamIndex: places(streams),
    componentIndex: places(components),
    rowIndex: places(rows),
  }
}

export type SolverHandle = {
  /** The newest answer; the last one stays while a newer is on its way. */
  solved: SolvedCase | null
  /** True while the shown answer is older than the state. */
  stale: boolean
  /** A plain sentence when the solver had to be restarted or gave up. */
  trouble: string | null
}
