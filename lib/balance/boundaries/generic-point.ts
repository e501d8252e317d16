import type { Settled } from '../conflicts/find-conflicts'
import { ColumnKind, type Model } from '../model'
import type { BookRows } from '../workings/book-rows'

/**
 * A generic solution for counting ranks: the solver's own, with streams of one composition that is not settled yet given
 * their common one. Length nColumns. Flows that are 0 in every solution stay 0.
 */
export function genericPoint(model: Model, { resolved }: Settled, { groups }: BookRows): Float64Array {
  const point = Float64Array.from(resolved.knowledge.generic.value)
  const at = (s: number, c: number): number => model.flowColumn[s * model.nComponents + c] as number
  if (resolved.left.length > 0)
    for (const { streams, components } of groups) {
      const sums = components.map((c) => streams.reduce((sum, s) => sum + (point[at(s, c)] as number), 0))
      const all = sums.reduce((sum, value) => sum + value, 0)
      if (all === 0) continue
      for (const s of streams) {
        const flow = components.reduce((sum, c) => sum + (point[at(s, c)] as number), 0)
        components.forEach((c, k) => {
          point[at(s, c)] = (flow * (sums[k] as number)) / all
        })
      }
    }
  for (let s = 0; s < model.nStreams; s++) {
    const total = model.totalColumn[s] as number
    if (total < 0 || model.columnKind[total] !== ColumnKind.total) continue
    point[total] = (model.present[s] as number[]).reduce((sum, c) => sum + (point[at(s, c)] as number), 0)
  }
  return point
}
