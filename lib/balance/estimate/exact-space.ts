import type { LinearForm, Measure } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import { directionOf } from '../sparse/solve'
import type { Knowledge } from '../states/knowledge'
import { formAt } from './readings'

/**
 * All points that the linear exact rows allow: `point` plus any mix of `n` directions. Each unknown's share of the
 * directions is kept sparse: those of column j stand at `start[j]` to `start[j + 1]`.
 */
export type ExactSpace = {
  n: number
  point: Float64Array
  start: Int32Array
  direction: Int32Array
  factor: Float64Array
}

/**
 * The space of points that what is known exactly leaves open, with `more` further unknowns, each free. Cost: one
 * back-substitution a free column.
 */
export function exactSpace({ elimination: e, particular }: Knowledge, more: number): ExactSpace {
  const { nColumns } = e.rows
  const entries: { direction: number; factor: number }[][] = Array.from({ length: nColumns }, () => [])
  e.free.forEach((column, q) => {
    const along = directionOf(e, column)
    for (let j = 0; j < nColumns; j++)
      if (along[j] !== 0) entries[j]?.push({ direction: q, factor: along[j] as number })
  })
  for (let k = 0; k < more; k++) entries.push([{ direction: e.free.length + k, factor: 1 }])
  const start = new Int32Array(nColumns + more + 1)
  entries.forEach((list, j) => {
    start[j + 1] = (start[j] as number) + list.length
  })
  const flat = entries.flat()
  return {
    n: e.free.length + more,
    point: Float64Array.from([...particular.value, ...new Float64Array(more)]),
    start,
    direction: Int32Array.from(flat, ({ direction }) => direction),
    factor: Float64Array.from(flat, ({ factor }) => factor),
  }
}

/** Adds `times` the gradient of a form along the directions to g (length n). */
export function addGradient(space: ExactSpace, form: LinearForm, times: number, g: Float64Array): void {
  for (let k = 0; k < form.columns.length; k++) {
    const j = form.columns[k] as number
    const a = times * (form.coefficients[k] as number)
    for (let at = space.start[j] as number; at < (space.start[j + 1] as number); at++)
      g[space.direction[at] as number]! += a * (space.factor[at] as number)
  }
}

/** Gradient of a measure along the directions at x, times `times`. */
export function gradientOf(space: ExactSpace, measure: Measure, x: Float64Array, times = 1): Float64Array {
  const g = new Float64Array(space.n)
  const { numerator, denominator } = measure
  if (!denominator) addGradient(space, numerator, times, g)
  else {
    const bottom = formAt(denominator, x)
    addGradient(space, numerator, times / bottom, g)
    addGradient(space, denominator, (-times * formAt(numerator, x)) / (bottom * bottom), g)
  }
  return g
}

/** x moved by a mix of the directions (length n). */
export function movedBy(space: ExactSpace, x: Float64Array, step: Float64Array, factor = 1): Float64Array {
  return x.map((value, j) => {
    let sum = 0
    for (let at = space.start[j] as number; at < (space.start[j + 1] as number); at++)
      sum += (space.factor[at] as number) * (step[space.direction[at] as number] as number)
    return value + factor * sum
  })
}

/** Columns that are flows and can move: what must not become negative. */
export function movingFlows(model: Model, space: ExactSpace): number[] {
  const columns: number[] = []
  for (let j = 0; j < model.nColumns; j++)
    if (
      (model.columnKind[j] as number) <= ColumnKind.otherTotal &&
      (space.start[j + 1] as number) > (space.start[j] as number)
    )
      columns.push(j)
  return columns
}

/** True where every point of the space gives the form 0. */
export const isAlwaysZero = (space: ExactSpace, form: LinearForm): boolean =>
  form.constant === 0 && form.columns.every((j) => space.point[j] === 0 && space.start[j] === space.start[j + 1])
