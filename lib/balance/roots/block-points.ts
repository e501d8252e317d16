import { ColumnKind, type Model } from '../model'
import { poolTotal } from '../pending/pool'
import { seededRandom } from '../random'
import type { Block } from './blocks'
import { equationsOf } from './equations'
import type { FreeSpace } from './free-space'
import { leastSquares, type Residuals } from './least-squares'
import { along, type TangentRow, tangentRows } from './tangent-rows'
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
const STARTS = 10
const MOST_POINTS = 4
const MET = 1e-9
const POLISHED = 1e-15
/** Flows may be negative by this part of their size. */
const NEGATIVE = 1e-8
/** Points that differ by less than this part of a flow's size are one. */
const SAME = 1e-7
const NO_FLOW = 1e-7

/** Searches solutions of a block's equations among the solutions of the linear rows, from seeded starts. */
export function blockPoints(model: Model, space: FreeSpace, block: Block, work: Work): BlockPoints | undefined {
  const n = block.directions.length
  if (n === 0 || n > MOST_DIRECTIONS) return undefined
  const search = new Search(model, space, block)
  const random = seededRandom(4021)
  const points: BlockPoint[] = []
  let hits = 0
  let signless: BlockPoint | undefined
  for (let start = 0; start < STARTS; start++) {
    if (!work.take(search.cost)) return undefined
    const from = Float64Array.from({ length: n }, () => 2 * random() - 0.5)
    const least = start % 2 === 0 ? 0.3 : 0.02
    const inside = leastSquares(
      search.signs((size) => size * least * (0.5 + random())),
      from,
      0,
    )
    const found = inside && leastSquares(search.equations(true), inside.t, MET)
    if (found && found.worst <= MET) {
      const point = search.pointAt(found.t, true)
      if (!point) continue
      hits++
      if (!points.some((other) => search.isSame(other, point))) points.push(point)
      continue
    }
    if (signless || points.length > 0) continue
    const anywhere = leastSquares(search.equations(false), inside?.t ?? from, MET)
    if (anywhere && anywhere.worst <= MET) signless = search.pointAt(anywhere.t, false)
  }
  const isDetermined = points.length > 0 && points.every(({ rows }) => rows.length === n)
  // What one start alone came upon is too little to rest a value on.
  const enough = hits >= 2 && (isDetermined || points.length >= 2)
  const kept = enough ? points.slice(0, isDetermined ? undefined : MOST_POINTS) : []
  const rank = kept[0] ?? points[0] ?? signless
  return { points: kept, ...(rank && { generic: rank }), isDetermined: isDetermined && kept.length > 0 }
}

class Search {
  readonly cost: number
  private readonly directions: Float64Array[]
  private readonly touched: number[]
  /** Flows that only this block moves: those that must not come out negative. */
  private readonly own: number[]

  constructor(
    private readonly model: Model,
    private readonly space: FreeSpace,
    private readonly block: Block,
  ) {
    this.directions = block.directions.map((q) => space.directions[q] as Float64Array)
    const mine = new Set(block.directions)
    const others = space.directions.filter((_, q) => !mine.has(q))
    this.touched = []
    for (let j = 0; j < model.nColumns; j++) if (this.directions.some((h) => h[j] !== 0)) this.touched.push(j)
    this.own = this.touched.filter(
      (j) => (model.columnKind[j] as number) <= ColumnKind.total && others.every((h) => h[j] === 0),
    )
    const n = this.directions.length
    this.cost = 60 * n * n * (n + this.own.length + 10 * block.items.length)
  }

  private at(t: Float64Array): Float64Array {
    const x = Float64Array.from(this.space.point)
    for (const [q, h] of this.directions.entries())
      for (const j of this.touched) x[j]! += (t[q] as number) * (h[j] as number)
    return x
  }

  /** How far flows are below a least value drawn for each. */
  signs(least: (size: number) => number): Residuals {
    const floor = this.own.map((j) => least(this.space.size[j] as number))
    return (t) => this.below(this.at(t), floor)
  }

  private below(x: Float64Array, floor: readonly number[]): { rest: number[]; gradient: Float64Array[] } {
    const rest: number[] = []
    const gradient: Float64Array[] = []
    this.own.forEach((j, k) => {
      const under = (x[j] as number) - (floor[k] as number)
      const size = this.space.size[j] as number
      if (under >= 0) return
      rest.push(under / size)
      gradient.push(Float64Array.from(this.directions, (h) => (h[j] as number) / size))
    })
    return { rest, gradient }
  }

  equations(withSigns: boolean): Residuals {
    const floor = this.own.map(() => 0)
    return (t) => {
      const x = this.at(t)
      const signs = withSigns ? this.below(x, floor) : { rest: [], gradient: [] }
      for (const equation of this.block.items.flatMap((item) => equationsOf(this.model, item, x))) {
        const terms = equation.terms || 1
        if (!Number.isFinite(equation.value) || !equation.gradient.coefficients.every(Number.isFinite)) return undefined
        signs.rest.push(equation.value / terms)
        signs.gradient.push(along(equation.gradient, this.directions, terms))
      }
      return signs
    }
  }

  /** The point sharpened, with independent tangent rows; undefined where it is a false one or its rank is unsure. */
  pointAt(rough: Float64Array, withSigns: boolean): BlockPoint | undefined {
    const fine = leastSquares(this.equations(false), rough, POLISHED)
    if (!fine || fine.worst > 1e-12) return undefined
    const x = this.at(fine.t)
    if (withSigns && this.own.some((j) => (x[j] as number) < -NEGATIVE * (this.space.size[j] as number)))
      return undefined
    if (!this.flows(x)) return undefined
    const rows = tangentRows(this.model, this.block, this.directions, x)
    return rows && { x, rows }
  }

  /** False where a stream of an equal composition has no flow: such a point meets the equations falsely. */
  private flows(x: Float64Array): boolean {
    return this.block.items.every(
      (item) =>
        item.kind !== 'composition' ||
        item.composition.streams.every((s) => {
          const [column = -1] = poolTotal(this.model, [s]).columns
          return column < 0 || Math.abs(x[column] as number) > NO_FLOW * (this.space.size[column] as number)
        }),
    )
  }

  isSame(a: BlockPoint, b: BlockPoint): boolean {
    return this.touched.every(
      (j) => Math.abs((a.x[j] as number) - (b.x[j] as number)) <= SAME * (this.space.size[j] as number),
    )
  }
}
