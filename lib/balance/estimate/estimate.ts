import { ColumnKind, type Model } from '../model'
import type { Equation } from './exact-equations'
import { addGradient, type ExactSpace, gradientOf, movedBy, movingFlows } from './exact-space'
import { leastSquares, offRows, onRows, type PivotedQr, pivotedQr } from './pivoted-qr'
import { measureAt, type Reading } from './readings'
import { dot, type Linearised, stepFactor, usualSize } from './step-factor'
import { onFree, reduceTies, type Ties, wholeMove } from './tied'

/** The least squares estimate: where it stands, and the readings' gradients there as factors over the free places. */
export type Estimate = {
  x: Float64Array
  objective: number
  iterations: number
  converged: boolean
  /** Flows held at 0, which the readings alone would make negative. */
  boundsActive: number
  ties: Ties
  /** Size of a step of each place of the space, length n. */
  scale: Float64Array
  /** Readings (rows) by free places (columns), each over its standard deviation; bounds are left out. */
  qr: PivotedQr
  /** (reading - estimate) / sigma, length readings. */
  residual: Float64Array
}

const MOST_STEPS = 80
const MOST_BOUND_CHANGES = 60
/** Weight of a step's own length beside the readings (Levenberg, Q. Appl. Math. 2, 1944): least that is felt, most, light. */
const LEAST_DAMPING = 1e-9
const MOST_DAMPING = 1e6
const LIGHT_DAMPING = 1e-4
/** A step that must be cut more than this is damped instead. */
const LEAST_FACTOR = 0.2
/** An equation that is not met yet cannot tell dependent from independent any better than it is met. */
const DOUBT = 0.1
/** A place that weighs less than this part of itself in the readings is not seen by them. */
const SEEN = 1e-10
/** A flow below 0 by less than this part of the usual flow is rounding. */
const NEGATIVE = 1e-9
/** A gradient that the readings span but for this part of itself is seen. */
export const SPANNED = 1e-6

/**
 * Minimises the sum of squares of (reading - measure) / sigma over the points that keep all exact rows, with flows not
 * negative: Gauss-Newton steps (successive linearisation; Knepper and Gorman, AIChE J. 26, 1980) with step control, an
 * active set for flows at 0. Never throws; `converged` says whether it settled.
 */
export function estimate(
  model: Model,
  space: ExactSpace,
  readings: readonly Reading[],
  equations: readonly Equation[],
  start: Float64Array,
): Estimate {
  const flows = movingFlows(model, space)
  const totals = flows.filter((j) => model.columnKind[j] !== ColumnKind.componentFlow)
  const usual = usualSize(start)
  let x = start
  let held: number[] = []
  let converged = false
  let iterations = 0
  const scale = scaleOf(space, start, usual)
  let bounded = false
  let damping = equations.length > 0 ? LEAST_DAMPING : 0
  while (iterations < MOST_STEPS) {
    iterations++
    const at = linearise(space, readings, equations, x)
    let factor = 0
    let gain = 0
    let step: Float64Array = new Float64Array(space.n)
    let now = held
    for (; ; damping = Math.max(10 * damping, LEAST_DAMPING)) {
      const tried = boundedStep(space, at, x, bounded ? flows : [], held, scale, usual, damping)
      step = tried.step
      now = tried.held
      ;({ factor, gain } = stepFactor(space, readings, equations, x, step, at, totals, bounded ? flows : []))
      if (factor >= LEAST_FACTOR || damping >= MOST_DAMPING) break
    }
    const same = now.length === held.length && now.every((j) => held.includes(j))
    held = now
    const next = movedBy(space, x, step, factor)
    let change = 0
    for (let j = 0; j < x.length; j++)
      change = Math.max(
        change,
        Math.abs((next[j] as number) - (x[j] as number)) / (Math.abs(next[j] as number) + 1e-3 * usual),
      )
    x = next
    for (const j of held) if (factor === 1) x[j] = 0
    const isLight = damping <= LIGHT_DAMPING
    if (factor === 1) damping = damping <= 10 * LEAST_DAMPING ? 0 : damping / 10
    const settled = ((change < 1e-10 || gain <= 1e-13) && same && isLight) || readings.length === 0
    if (settled || factor < 1e-6) {
      if (bounded) {
        converged = settled
        break
      }
      // Only an estimate that has settled tells which flows the readings would make negative.
      bounded = true
      if (!settled) {
        x = start
        damping = 1
      }
    }
  }
  const at = linearise(space, readings, equations, x)
  const open = at.equations.some(({ value, size }) => Math.abs(value) > 1e-8 * size)
  const ties = reduceTies(
    at.slopes.map((slope) => slope.slice()),
    at.equations.map(() => 0),
    space.n,
    scale,
  )
  const qr = factorsOf(at.gradients, ties, scale, readings.length)
  return {
    x,
    objective: at.residual.reduce((sum, r) => sum + r * r, 0),
    iterations,
    converged: converged && !open && x.every(Number.isFinite),
    boundsActive: held.length,
    ties,
    scale,
    qr,
    residual: at.residual,
  }
}

function linearise(
  space: ExactSpace,
  readings: readonly Reading[],
  equations: readonly Equation[],
  x: Float64Array,
): Linearised {
  const sloped = equations.map((equation) => equation(x))
  return {
    residual: Float64Array.from(readings, ({ measure, value, sigma }) => (value - measureAt(measure, x)) / sigma),
    gradients: readings.map(({ measure, sigma }) => gradientOf(space, measure, x, 1 / sigma)),
    equations: sloped,
    slopes: sloped.map(({ slope, factors }) => {
      const g = new Float64Array(space.n)
      slope.forEach((form, k) => {
        addGradient(space, form, factors[k] as number, g)
      })
      return g
    }),
  }
}

/** Gradients of the readings over the free places, scaled, as columns to factor. */
function factorsOf(gradients: readonly Float64Array[], ties: Ties, scale: Float64Array, nReadings: number): PivotedQr {
  const rows = gradients.map((g) => onFree(ties, g))
  const columns = ties.free.map((q, k) =>
    Float64Array.from({ length: nReadings }, (_, i) => ((rows[i] as Float64Array)[k] as number) * (scale[q] as number)),
  )
  return pivotedQr(columns, nReadings, SEEN)
}

/** One step of the linearised problem with flows at least 0: an active set of flows held at 0. */
function boundedStep(
  space: ExactSpace,
  { residual, gradients, equations, slopes }: Linearised,
  x: Float64Array,
  flows: readonly number[],
  before: readonly number[],
  scale: Float64Array,
  usual: number,
  damping: number,
): { step: Float64Array; held: number[] } {
  const missed = equations.reduce((most, { value, size }) => Math.max(most, size > 0 ? Math.abs(value) / size : 0), 0)
  const tolerance = Math.min(Math.max(DOUBT * missed, 1e-9), 1e-3)
  const held = [...before]
  const gradientOfFlow = (j: number): Float64Array => {
    const g = new Float64Array(space.n)
    addGradient(space, { columns: [j], coefficients: [1], constant: 0 }, 1, g)
    return g
  }
  for (let change = 0; ; change++) {
    const rows = [...slopes, ...held.map(gradientOfFlow)]
    const rhs = [...equations.map(({ value }) => -value), ...held.map((j) => -(x[j] as number))]
    const ties = reduceTies(
      rows.map((row) => row.slice()),
      rhs,
      space.n,
      scale,
      tolerance,
    )
    const closing = wholeMove(ties, new Float64Array(ties.free.length), true)
    const b = Float64Array.from(residual, (r, i) => r - dot(gradients[i] as Float64Array, closing))
    const qr = factorsOf(gradients, ties, scale, residual.length)
    const move = (damping > 0 ? dampedMove(gradients, ties, scale, b, closing, damping) : leastSquares(qr, b)).map(
      (value, k) => value * (scale[ties.free[k] as number] as number),
    )
    const step = wholeMove(ties, move, true)
    if (change >= MOST_BOUND_CHANGES) return { step, held }
    const next = movedBy(space, x, step)
    let worst = -1
    let depth = NEGATIVE * usual
    for (const j of flows) {
      if (-(next[j] as number) <= depth || held.includes(j)) continue
      const g = onFree(ties, gradientOfFlow(j)).map((value, k) => value * (scale[ties.free[k] as number] as number))
      if (offRows(qr, g, onRows(qr, g)) > SPANNED) continue
      depth = -(next[j] as number)
      worst = j
    }
    if (worst >= 0) {
      held.push(worst)
      continue
    }
    const drop = wrongSide(rows, gradients, residual, step, slopes.length, scale)
    if (drop < 0) return { step, held }
    held.splice(drop, 1)
  }
}

/** The move of the free places that answers the readings and keeps the whole step short, in the places' scales. */
function dampedMove(
  gradients: readonly Float64Array[],
  ties: Ties,
  scale: Float64Array,
  b: Float64Array,
  closing: Float64Array,
  damping: number,
): Float64Array {
  const weight = Math.sqrt(damping)
  const m = b.length + closing.length
  const rows = gradients.map((g) => onFree(ties, g))
  const place = new Map(ties.tied.map((q, t) => [q, t]))
  const columns = ties.free.map((q, k) => {
    const column = new Float64Array(m)
    const own = scale[q] as number
    for (let i = 0; i < b.length; i++) column[i] = ((rows[i] as Float64Array)[k] as number) * own
    column[b.length + q] = weight
    for (const [tied, t] of place)
      column[b.length + tied] =
        (-weight * ((ties.matrix[t] as Float64Array)[k] as number) * own) / (scale[tied] as number)
    return column
  })
  const rhs = new Float64Array(m)
  rhs.set(b)
  closing.forEach((value, q) => {
    rhs[b.length + q] = (-weight * value) / (scale[q] as number)
  })
  return leastSquares(pivotedQr(columns, m, SEEN), rhs)
}

/** The held flow that the readings push most to above 0, by the sign of its multiplier; -1 where none is. */
function wrongSide(
  rows: Float64Array[],
  gradients: readonly Float64Array[],
  residual: Float64Array,
  step: Float64Array,
  first: number,
  scale: Float64Array,
): number {
  if (rows.length === first) return -1
  const n = step.length
  const pull = new Float64Array(n)
  gradients.forEach((g, i) => {
    const rest = (residual[i] as number) - dot(g, step)
    for (let q = 0; q < n; q++) pull[q]! -= rest * (g[q] as number) * (scale[q] as number)
  })
  const columns = rows.map((row) => row.map((value, q) => value * (scale[q] as number)))
  const lengths = columns.map((column) => Math.sqrt(dot(column, column)) || 1)
  const multipliers = leastSquares(
    pivotedQr(
      columns.map((column, k) => column.map((value) => value / (lengths[k] as number))),
      n,
      1e-9,
    ),
    pull,
  )
  let drop = -1
  let least = -1e-9
  for (let k = first; k < rows.length; k++)
    if ((multipliers[k] as number) < least) {
      least = multipliers[k] as number
      drop = k - first
    }
  return drop
}

/** What a step of each place is worth: the largest unknown that it moves, over how much it moves it, is near 1. */
function scaleOf(space: ExactSpace, x: Float64Array, usual: number): Float64Array {
  const scale = new Float64Array(space.n).fill(Number.POSITIVE_INFINITY)
  for (let j = 0; j < x.length; j++)
    for (let at = space.start[j] as number; at < (space.start[j + 1] as number); at++) {
      const q = space.direction[at] as number
      const worth = Math.max(Math.abs(x[j] as number), 1e-6 * usual) / Math.abs(space.factor[at] as number)
      scale[q] = Math.min(scale[q] as number, worth)
    }
  return scale
}

/** What the estimate says of one gradient over all places: its deviation, NaN where the readings do not see it. */
export function deviationOf(
  est: Pick<Estimate, 'ties' | 'scale' | 'qr'>,
  g: Float64Array,
): { a: Float64Array; deviation: number } {
  const its = onFree(est.ties, g).map((value, k) => value * (est.scale[est.ties.free[k] as number] as number))
  const a = onRows(est.qr, its)
  if (offRows(est.qr, its, a) > SPANNED) return { a, deviation: Number.NaN }
  return { a, deviation: Math.sqrt(dot(a, a)) }
}
