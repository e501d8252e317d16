import type { Model } from '../model'
import { seededRandom } from '../random'
import { BlockSearch } from './block-search'
import type { Block } from './blocks'
import type { FreeSpace } from './free-space'
import { leastSquares } from './least-squares'
import type { TangentRow } from './tangent-rows'
import type { Work } from './work'

export type BlockPoint = {
  /** Values of all columns; only those that the block moves differ from the linear rows' own point. */
  x: Float64Array
  rows: TangentRow[]
}

export type BlockPoints = {
  /** Solutions without negative flows, different ones, each come upon on its own. */
  points: BlockPoint[]
  /** A solution for counting: flows may be negative there. */
  generic?: BlockPoint
  /** Nothing in the block is free at any of the points. */
  isDetermined: boolean
}

/** Above this many directions the dense work would be felt. */
const MOST_DIRECTIONS = 120
const STARTS = 12
const MOST_POINTS = 4
/** Starts that come upon the same one point before the rest are spared. */
const SAME_POINT = 6

/** Searches solutions of a block's equations among the solutions of the linear rows, from seeded starts. */
export function blockPoints(model: Model, space: FreeSpace, block: Block, work: Work): BlockPoints | undefined {
  const n = block.directions.length
  if (n === 0 || n > MOST_DIRECTIONS) return undefined
  const search = new BlockSearch(model, space, block)
  const random = seededRandom(4021)
  const points: BlockPoint[] = []
  let hits = 0
  let anywhere: BlockPoint | undefined
  const isFull = ({ rows }: BlockPoint): boolean => rows.length === n
  for (let start = 0; start < STARTS; start++) {
    if (!work.take(search.cost)) return undefined
    const from = Float64Array.from({ length: n }, () => 2 * random() - 0.5)
    const least = start % 2 === 0 ? 0.3 : 0.02
    const inside = leastSquares(
      search.signs((size) => size * least * (0.5 + random())),
      from,
      0,
    )
    const found = inside && search.meet(inside.t, true)
    if (found) {
      const point = search.pointAt(found, true)
      if (!point) continue
      hits++
      if (!points.some((other) => search.isSame(other, point))) points.push(point)
      if (points.every(isFull) ? points.length === 1 && hits >= SAME_POINT : points.length >= MOST_POINTS) break
      continue
    }
    if (anywhere || points.length > 0) continue
    const signless = search.meet(inside?.t ?? from, false)
    if (signless) anywhere = search.pointAt(signless, false)
  }
  const isDetermined = points.length > 0 && points.every(isFull)
  // What one start alone came upon is too little to rest a value on.
  const enough = hits >= 2 && (isDetermined || points.length >= 2)
  const kept = enough ? points.slice(0, isDetermined ? undefined : MOST_POINTS) : []
  const generic = kept[0] ?? points[0] ?? anywhere
  return { points: kept, ...(generic && { generic }), isDetermined: isDetermined && enough }
}
