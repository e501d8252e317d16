import type { LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import type { BlockPoint } from './block-points'
import type { Block } from './blocks'
import { type Calculus, evaluateExpression, formAt, formsOf } from './equations'
import type { FreeSpace } from './free-space'
import { leastSquares, type Residuals } from './least-squares'
import { along, tangentRows } from './tangent-rows'

const POLISHED = 1e-15
const MET = 1e-12
/** Rough search: terms are measured anew this many times, since their own change would mislead the steps. */
const ROUNDS = 6
const ROUGHLY_MET = 1e-9
/** Flows may be negative by this part of their size. */
const NEGATIVE = 1e-8
/** Points that differ by less than this part of a flow's size are one. */
const SAME = 1e-7
const NO_FLOW = 1e-7

/** A block's equations and signs as functions of the factors t of its directions (length block.directions). */
export class BlockSearch {
  /** Operations of one start. */
  readonly cost: number
  private readonly directions: Float64Array[]
  private readonly touched: number[]
  /** Flows that only this block moves: those that must not come out negative. */
  private readonly own: number[]
  private readonly ownGradients: Float64Array[]
  private readonly gradients = new Map<LinearForm, Float64Array>()

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
    this.ownGradients = this.own.map((j) =>
      Float64Array.from(this.directions, (h) => (h[j] as number) / (space.size[j] as number)),
    )
    for (const { equation } of block.equations)
      for (const form of formsOf(equation)) this.gradients.set(form, along(form, this.directions))
    const n = this.directions.length
    this.cost = 60 * n * (n * (n + block.equations.length) + this.touched.length)
  }

  private at(t: Float64Array): Float64Array {
    const x = Float64Array.from(this.space.point)
    for (const [q, h] of this.directions.entries()) {
      const factor = t[q] as number
      for (const j of this.touched) x[j]! += factor * (h[j] as number)
    }
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
    for (let k = 0; k < this.own.length; k++) {
      const j = this.own[k] as number
      const under = (x[j] as number) - (floor[k] as number)
      if (under >= 0) continue
      rest.push(under / (this.space.size[j] as number))
      gradient.push(this.ownGradients[k] as Float64Array)
    }
    return { rest, gradient }
  }

  private calculus(x: Float64Array): Calculus<Float64Array> {
    return {
      linear: (form) => ({ ...formAt(form, x), gradient: this.gradients.get(form) as Float64Array }),
      combine: (a, left, b, right) => {
        const sum = new Float64Array(left.length)
        for (let k = 0; k < sum.length; k++) sum[k] = a * (left[k] as number) + b * (right[k] as number)
        return sum
      },
    }
  }

  /** What is left of each equation as a part of what its terms are at `from` and, if asked for, of flows below 0. */
  private equations(withSigns: boolean, from: Float64Array): Residuals {
    const floor = this.own.map(() => 0)
    const start = this.calculus(this.at(from))
    const sizes = this.block.equations.map(({ equation }) => evaluateExpression(equation, start).terms)
    return (t) => {
      const x = this.at(t)
      const calculus = this.calculus(x)
      const all = withSigns ? this.below(x, floor) : { rest: [], gradient: [] }
      for (const [i, { equation }] of this.block.equations.entries()) {
        const { value, gradient } = evaluateExpression(equation, calculus)
        const size = sizes[i] || 1
        const scaled = new Float64Array(gradient.length)
        let sum = value
        for (let k = 0; k < scaled.length; k++) {
          scaled[k] = (gradient[k] as number) / size
          sum += scaled[k] as number
        }
        if (!Number.isFinite(sum)) return undefined
        all.rest.push(value / size)
        all.gradient.push(scaled)
      }
      return all
    }
  }

  /** A place where all equations are roughly met; undefined where the way there ends before. */
  meet(start: Float64Array, withSigns: boolean): Float64Array | undefined {
    let t = start
    let before = Number.POSITIVE_INFINITY
    for (let round = 0; round < ROUNDS; round++) {
      const found = leastSquares(this.equations(withSigns, t), t, ROUGHLY_MET)
      if (!found) return undefined
      t = found.t
      if (found.worst <= ROUGHLY_MET) return t
      const again = this.equations(withSigns, t)(t)
      const worst = again ? Math.max(...again.rest.map(Math.abs)) : Number.POSITIVE_INFINITY
      if (worst > 0.9 * before) return undefined
      before = worst
    }
    return undefined
  }

  /** The point sharpened, with independent tangent rows; undefined where it is a false one or its rank is unsure. */
  pointAt(rough: Float64Array, withSigns: boolean): BlockPoint | undefined {
    const fine = leastSquares(this.equations(false, rough), rough, POLISHED)
    if (!fine || fine.worst > MET) return undefined
    const x = this.at(fine.t)
    if (withSigns && this.own.some((j) => (x[j] as number) < -NEGATIVE * (this.space.size[j] as number)))
      return undefined
    if (!this.flows(x)) return undefined
    const rows = tangentRows(this.block, this.directions, x)
    return rows && { x, rows }
  }

  /** False where a stream of an equal composition has no flow: such a point meets the equations falsely. */
  private flows(x: Float64Array): boolean {
    return this.block.items.every(
      (item) =>
        item.kind !== 'composition' ||
        item.composition.streams.every((s) => {
          const column = this.model.totalColumn[s] as number
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
