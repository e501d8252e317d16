import type { LinearForm, Measure } from '../measure/measure'
import { freeSpace } from '../roots/free-space'
import { Work } from '../roots/work'
import type { SettledModel } from '../settled-of'
import { streamsAtOdds } from '../states/at-odds-blocks'
import { blocksOf, columnsOfPending } from '../states/free-scale'
import type { LinearProgramme } from './programme'

/** Why there are no limits: nothing to be known, a clash in the block, a flow that would be negative, too much that is free. */
export type Why = 'noCell' | 'atOdds' | 'negativeFlow' | 'tooLarge' | 'failed'

/** All solutions of the rows round a measure: a point and directions, with a row for each flow that must not be negative. */
export type Region = {
  nFree: number
  point: Float64Array
  directions: Float64Array[]
  rows: LinearProgramme['rows']
  /** A rule that multiplies unknowns is left out. */
  atLeastAsWide: boolean
}

const WORK = 4e8
const MOST_ENTRIES = 2e6
/** Moves and values below this part of the size of a column are rounding. */
const STILL = 1e-10
const NEGATIVE = 1e-7

/** The block of what is joined to the measure; nothing outside bears on it. */
export function regionOf(
  { model, settled }: SettledModel,
  stream: number,
  { numerator, denominator }: Measure,
): Region | Why {
  if (streamsAtOdds(model, settled)(stream)) return 'atOdds'
  const { assembly, resolved } = settled
  const find = blocksOf(model, assembly)
  const blocks = new Set([...numerator.columns, ...(denominator?.columns ?? [])].map(find))
  const isIn = (column: number): boolean => blocks.has(find(column))
  const space = freeSpace(resolved.knowledge, new Work(WORK))
  if (!space) return 'tooLarge'
  const { point, size } = space
  const columns = [...point.keys()].filter(isIn)
  const directions = space.directions.filter((h) =>
    columns.some((j) => Math.abs(h[j] as number) > STILL * (size[j] as number)),
  )
  const nFree = directions.length
  const rows: Region['rows'] = []
  for (const j of columns) {
    if (!assembly.nonNegative[j]) continue
    const by = size[j] as number
    const coefficients = Float64Array.from(directions, (h) => still((h[j] as number) / by))
    const least = -(point[j] as number) / by
    const most = coefficients.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0)
    if (most === 0) {
      if (least > NEGATIVE) return 'negativeFlow'
      continue
    }
    const whole = Math.max(most, Math.abs(least))
    rows.push({ coefficients: coefficients.map((value) => value / whole), relation: '>=', rhs: still(least / whole) })
  }
  if (rows.length * nFree > MOST_ENTRIES) return 'tooLarge'
  const atLeastAsWide = resolved.left.some((item) => columnsOfPending(model, item).some((j) => j >= 0 && isIn(j)))
  return { nFree, point, directions, rows, atLeastAsWide }
}

const still = (value: number): number => (Math.abs(value) <= STILL ? 0 : value)

/** A form over the directions: what each moves it by, and its value at the point. */
export function readAlong(
  { point, directions }: Region,
  { columns, coefficients, constant }: LinearForm,
): { moves: Float64Array; constant: number } {
  const along = (x: Float64Array, from: number): number => {
    let value = from
    let terms = Math.abs(from)
    columns.forEach((j, k) => {
      const term = (coefficients[k] as number) * (x[j] as number)
      value += term
      terms += Math.abs(term)
    })
    return Math.abs(value) <= STILL * terms ? 0 : value
  }
  return { moves: Float64Array.from(directions, (h) => along(h, 0)), constant: along(point, constant) }
}
