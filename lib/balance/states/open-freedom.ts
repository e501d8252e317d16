import { constantForm, type LinearForm } from '../measure/measure'
import type { Model } from '../model'
import type { Composition } from '../pending/composition'
import type { Pending } from '../pending/pending'
import { poolPart, poolTotal } from '../pending/pool'
import { seededRandom } from '../random'
import { smallRank } from '../sparse/small-rank'
import { directionOf } from '../sparse/solve'
import type { Knowledge } from './knowledge'

/** Above this many free columns the dense work would be felt; the count then leaves the rules out. */
const MOST_FREE = 120
const STARTS = 6
const STEPS = 60
/** An equation is met when what is left of it is below this part of its terms. */
const MET = 1e-9
const INDEPENDENT = 1e-7

/** One equation that is not linear: left x right - below x other = 0, each a linear form. */
type Product = { left: LinearForm; right: LinearForm; below: LinearForm; other: LinearForm }

/**
 * How many of the freedoms that the linear rows leave are taken by equal compositions and free ratios that could not be
 * turned linear: the rank of their gradients at a generic solution, which is sought by damped Gauss-Newton steps from
 * random starts. 0 where none is found, or where a formula is among them: the count is then of the linear rows alone.
 */
export function takenByPending(model: Model, knowledge: Knowledge, left: readonly Pending[]): number {
  const e = knowledge.elimination
  if (left.length === 0 || e.free.length === 0 || e.free.length > MOST_FREE) return 0
  if (left.some(({ kind }) => kind === 'formula')) return 0
  const products = left.flatMap((item): Product[] => {
    if (item.kind === 'composition') return productsOf(model, item.composition)
    if (item.kind !== 'scaled') return []
    const parameter: LinearForm = { columns: [item.parameter], coefficients: [1], constant: 0 }
    const { numerator, denominator = constantForm(1) } = item.measure
    return [{ left: numerator, right: constantForm(1), below: parameter, other: denominator }]
  })
  const scale = Math.exp(meanLog(knowledge.generic.value))
  const directions = e.free.map((column) => directionOf(e, column).map((value) => scale * value))
  const random = seededRandom(4021)
  const ranks = new Map<number, number>()
  for (let start = 0; start < STARTS; start++) {
    const x = Float64Array.from(knowledge.particular.value)
    for (const h of directions) shift(x, 0.2 + random(), h)
    const gradients = approach(products, directions, x)
    if (!gradients || !flows(model, left, x, scale)) continue
    const rank = rankOf(gradients)
    ranks.set(rank, (ranks.get(rank) ?? 0) + 1)
  }
  // Starts that came out on a special branch are outvoted.
  return [...ranks].sort(([a, votes], [b, others]) => others - votes || b - a)[0]?.[0] ?? 0
}

function productsOf(model: Model, { streams, components }: Composition): Product[] {
  const [first, ...rest] = streams as [number, ...number[]]
  // One component of each follows from the others.
  return rest.flatMap((s) =>
    components.slice(1).map((c) => ({
      left: poolPart(model, [s], c),
      right: poolTotal(model, [first]),
      below: poolPart(model, [first], c),
      other: poolTotal(model, [s]),
    })),
  )
}

const at = (form: LinearForm, x: Float64Array, constant = form.constant): number => {
  let sum = constant
  for (let k = 0; k < form.columns.length; k++)
    sum += (form.coefficients[k] as number) * (x[form.columns[k] as number] as number)
  return sum
}

function shift(x: Float64Array, factor: number, h: Float64Array): void {
  for (let j = 0; j < x.length; j++) x[j]! += factor * (h[j] as number)
}

function meanLog(x: Float64Array): number {
  let sum = 0
  let count = 0
  for (const value of x)
    if (value !== 0) {
      sum += Math.log(Math.abs(value))
      count++
    }
  return count === 0 ? 0 : sum / count
}

/** Moves x onto the equations along the directions; their gradients there (one row each), or undefined where it fails. */
function approach(products: Product[], directions: Float64Array[], x: Float64Array): number[][] | undefined {
  for (let step = 0; step < STEPS; step++) {
    const rows = products.map(({ left, right, below, other }) => {
      const [a, b, c, d] = [at(left, x), at(right, x), at(below, x), at(other, x)]
      const size = Math.abs(a * b) + Math.abs(c * d) || 1
      return {
        rest: (a * b - c * d) / size,
        gradient: directions.map(
          (h) => (at(left, h, 0) * b + a * at(right, h, 0) - at(below, h, 0) * d - c * at(other, h, 0)) / size,
        ),
      }
    })
    if (rows.every(({ rest }) => Math.abs(rest) <= MET)) return rows.map(({ gradient }) => gradient)
    const change = leastChange(rows)
    if (!change) return undefined
    for (const [q, h] of directions.entries()) shift(x, change[q] as number, h)
  }
  return undefined
}

/** The smallest step that meets the linearised equations; those that depend on others are passed over. */
function leastChange(rows: { rest: number; gradient: number[] }[]): number[] | undefined {
  const nDirections = rows[0]?.gradient.length ?? 0
  const basis: { gradient: number[]; rest: number }[] = []
  for (const { rest, gradient } of rows) {
    const size = Math.sqrt(dot(gradient, gradient))
    if (size < INDEPENDENT) continue
    const row = gradient.map((value) => value / size)
    let left = rest / size
    // Twice, so that the rows come out orthogonal to rounding (Gram-Schmidt).
    for (let pass = 0; pass < 2; pass++)
      for (const other of basis) {
        const part = dot(row, other.gradient)
        for (let k = 0; k < nDirections; k++) row[k]! -= part * (other.gradient[k] as number)
        left -= part * other.rest
      }
    const length = Math.sqrt(dot(row, row))
    if (length > INDEPENDENT) basis.push({ gradient: row.map((value) => value / length), rest: left / length })
  }
  const change = new Array<number>(nDirections).fill(0)
  for (const { gradient, rest } of basis)
    for (let k = 0; k < nDirections; k++) change[k]! -= rest * (gradient[k] as number)
  return change.every(Number.isFinite) ? change : undefined
}

const dot = (a: number[], b: number[]): number => a.reduce((sum, value, k) => sum + value * (b[k] as number), 0)

/** True where no stream of a composition has come out with no flow: such a point meets the equations falsely. */
function flows(model: Model, left: readonly Pending[], x: Float64Array, scale: number): boolean {
  return left.every(
    (item) =>
      item.kind !== 'composition' ||
      item.composition.streams.every((s) => Math.abs(at(poolTotal(model, [s]), x)) > 1e-6 * scale),
  )
}

function rankOf(rows: number[][]): number {
  const scaled = rows.map((row) => {
    const size = Math.sqrt(dot(row, row))
    // An equation that the linear rows imply has no gradient but rounding.
    return size < INDEPENDENT ? row.map(() => 0) : row.map((value) => value / size)
  })
  return smallRank(scaled, INDEPENDENT)
}
