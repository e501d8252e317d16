import { combine, constantForm, type LinearForm } from '../measure/measure'
import { ColumnKind, type Model, otherPerOwn } from '../model'
import { seededRandom } from '../random'
import type { Equations, Sloped } from './exact-equations'
import { addGradient, type ExactSpace, movedBy } from './exact-space'
import { formAt, type Reading } from './readings'

/** How far, relative to its size, an unknown may lie from a plain guess before the guess is felt. */
const LOOSE = 3
/** Held nearer than this, a guess would drown the readings' digits. */
const TIGHTEST = 1e-3
/** An unknown that comes out negative is held nearer to its guess, at most so often. */
const ROUNDS = 8
/** A trace component is guessed no smaller than this part of its stream. */
const TRACE = 1e-3

/**
 * A point that keeps the linear exact rows, near the readings where there are any and else near a plain guess (usual
 * flow, even composition), so that the first step of the estimate meets no empty stream. Later attempts (1, 2 …) start
 * elsewhere, reproducibly. Array length nColumns.
 */
export function startingPoint(
  model: Model,
  space: ExactSpace,
  readings: readonly Reading[],
  { list: equations, ratios }: Equations,
  attempt = 0,
): Float64Array {
  const guess = plainGuess(model, readings, ratios)
  if (attempt > 1) shake(guess, seededRandom(attempt))
  const looseness = new Float64Array(model.nColumns).fill(LOOSE)
  let x = near(space, readings, guess, looseness, [])
  const rounds = equations.length > 0 ? 3 * ROUNDS : ROUNDS
  for (let round = 0; round < rounds; round++) {
    let tightened = false
    for (let j = 0; j < model.nColumns; j++) {
      const isFlow = (model.columnKind[j] as number) <= ColumnKind.otherTotal
      const moves = space.start[j] !== space.start[j + 1]
      if (!isFlow || !moves || (x[j] as number) > 0.02 * (guess.size[j] as number)) continue
      if ((looseness[j] as number) < TIGHTEST) continue
      looseness[j]! /= 4
      tightened = true
    }
    const softness = Math.max(0.3 / 2 ** round, 1e-3)
    const soft = (attempt === 1 ? [] : equations).map((equation) => softened(equation(x), x, softness))
    if (!tightened && soft.every(({ isMet }) => isMet)) break
    x = near(space, readings, guess, looseness, soft)
  }
  return x
}

/** Guesses changed by up to a factor of 3 either way. */
function shake({ value, size }: { value: Float64Array; size: Float64Array }, random: () => number): void {
  value.forEach((own, j) => {
    const factor = 3 ** (2 * random() - 1)
    value[j] = own * factor
    size[j] = (size[j] as number) * factor
  })
}

/** An equation made linear at x, to be met to a part of its terms. */
function softened({ value, size, slope, factors }: Sloped, x: Float64Array, softness: number) {
  let form = constantForm(value)
  slope.forEach((its, k) => {
    const factor = factors[k] as number
    form = combine(1, form, factor, { ...its, constant: its.constant - formAt(its, x) })
  })
  return { form, weight: 1 / (softness * (size || 1)), isMet: Math.abs(value) <= 1e-3 * size }
}

/** The point nearest to readings and guess, an unknown's distance from its guess counting over looseness x size. */
function near(
  space: ExactSpace,
  readings: readonly Reading[],
  guess: { value: Float64Array; size: Float64Array },
  looseness: Float64Array,
  soft: readonly { form: LinearForm; weight: number }[],
): Float64Array {
  const { n } = space
  const normal = Array.from({ length: n }, () => new Float64Array(n))
  const rhs = new Float64Array(n)
  const g = new Float64Array(n)
  const pull = (form: LinearForm, weight: number): void => {
    g.fill(0)
    addGradient(space, form, weight, g)
    const rest = -weight * formAt(form, space.point)
    const places: number[] = []
    for (let q = 0; q < n; q++) if (g[q] !== 0) places.push(q)
    for (const p of places) {
      const row = normal[p] as Float64Array
      for (const q of places) row[q]! += (g[p] as number) * (g[q] as number)
      rhs[p]! += (g[p] as number) * rest
    }
  }
  for (let j = 0; j < guess.value.length; j++) {
    if (space.start[j] === space.start[j + 1]) continue
    pull(
      { columns: [j], coefficients: [1], constant: -(guess.value[j] as number) },
      1 / ((looseness[j] as number) * (guess.size[j] as number)),
    )
  }
  for (const { form, weight } of soft) pull(form, weight)
  for (const { measure, value, sigma } of readings) {
    const { numerator, denominator } = measure
    if (!denominator) pull({ ...numerator, constant: numerator.constant - value }, 1 / sigma)
    else {
      const bottom = Math.abs(formAt(denominator, guess.value))
      if (bottom > 0) pull(combine(1, numerator, -value, denominator), 1 / (sigma * bottom))
    }
  }
  return movedBy(space, space.point, solvePositive(normal, rhs))
}

function plainGuess(
  model: Model,
  readings: readonly Reading[],
  ratios: Equations['ratios'],
): { value: Float64Array; size: Float64Array } {
  const { nStreams, nComponents, problem } = model
  const flows = new Map<number, number>()
  const fractions = new Map<number, number>()
  for (const { given, stream, component, value } of readings) note(given.quantity, stream, component, value)
  for (const given of problem.givens ?? []) {
    if ((given.use ?? 'given') !== 'given' || given.sigma !== undefined || given.unit !== undefined) continue
    const component = given.component === undefined ? -1 : (model.componentIndex.get(given.component) as number)
    note(given.quantity, model.streamIndex.get(given.stream) as number, component, given.value)
  }
  function note(quantity: string, stream: number, component: number, value: number): void {
    if (quantity === 'flow' && value > 0) flows.set(stream, value)
    if (quantity === `${problem.basis}Fraction`) fractions.set(stream * nComponents + component, value)
  }
  const known = [...flows.values()]
  const usual = known.length > 0 ? Math.exp(known.reduce((sum, flow) => sum + Math.log(flow), 0) / known.length) : 1
  const value = new Float64Array(model.nColumns)
  const size = new Float64Array(model.nColumns).fill(usual)
  for (let s = 0; s < nStreams; s++) {
    const list = model.present[s] as number[]
    if (list.length === 0) continue
    const flow = flows.get(s) ?? usual
    const typed = list.map((c) => fractions.get(s * nComponents + c))
    const left = Math.max(1 - typed.reduce<number>((sum, its) => sum + (its ?? 0), 0), 0)
    const others = typed.filter((its) => its === undefined).length
    let other = 0
    list.forEach((c, k) => {
      const part = flow * (typed[k] ?? left / others)
      const column = model.flowColumn[s * nComponents + c] as number
      value[column] = part
      size[column] = Math.max(part, TRACE * flow)
      other += part * otherPerOwn(model, c)
    })
    const total = model.totalColumn[s] as number
    value[total] = flow
    size[total] = flow
    const otherTotal = model.otherTotalColumn[s] as number
    if (otherTotal >= 0) {
      value[otherTotal] = other
      size[otherTotal] = other
    }
  }
  for (let j = 0; j < model.nColumns; j++)
    if (model.columnKind[j] === ColumnKind.parameter) {
      value[j] = 0.5
      size[j] = 1
    }
  const ratioOf = ({ of, to }: Equations['ratios'][number]): number => formAt(of, value) / formAt(to, value) || 1
  const guessed = ratios.map(ratioOf)
  return { value: Float64Array.from([...value, ...guessed]), size: Float64Array.from([...size, ...guessed]) }
}

/** Solves a positive definite system by Cholesky's factors, overwriting them; a place that has lost all digits stays 0. */
function solvePositive(a: Float64Array[], b: Float64Array): Float64Array {
  const n = b.length
  const x = Float64Array.from(b)
  const lost = new Uint8Array(n)
  for (let j = 0; j < n; j++) {
    const row = a[j] as Float64Array
    const before = row[j] as number
    let pivot = before
    for (let k = 0; k < j; k++) pivot -= (row[k] as number) ** 2
    if (!(pivot > 1e-14 * before)) {
      lost[j] = 1
      row.fill(0)
      for (let i = j + 1; i < n; i++) (a[i] as Float64Array)[j] = 0
      continue
    }
    const root = Math.sqrt(pivot)
    row[j] = root
    for (let i = j + 1; i < n; i++) {
      const other = a[i] as Float64Array
      let sum = other[j] as number
      for (let k = 0; k < j; k++) sum -= (other[k] as number) * (row[k] as number)
      other[j] = sum / root
    }
  }
  for (let j = 0; j < n; j++) {
    if (lost[j]) {
      x[j] = 0
      continue
    }
    const row = a[j] as Float64Array
    for (let k = 0; k < j; k++) x[j]! -= (row[k] as number) * (x[k] as number)
    x[j]! /= row[j] as number
  }
  for (let j = n - 1; j >= 0; j--) {
    if (lost[j]) continue
    for (let i = j + 1; i < n; i++) x[j]! -= ((a[i] as Float64Array)[j] as number) * (x[i] as number)
    x[j]! /= (a[j] as Float64Array)[j] as number
  }
  return x
}
