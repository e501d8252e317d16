import type { LinearForm } from '../measure/measure'
import { directionOf } from '../sparse/solve'
import type { Knowledge } from '../states/knowledge'
import { reduce } from './dense'
import type { Work } from './work'

/** Numbers that the directions may take up: 64 MB. */
const MOST_NUMBERS = 8e6

/** The solutions of the linear rows: one point and a direction (length nColumns each) for every free column. */
export type FreeSpace = {
  point: Float64Array
  directions: Float64Array[]
  /** A size for each column, never 0. */
  size: Float64Array
}

/** undefined where the rows leave too much free for dense work. */
export function freeSpace({ elimination: e, particular, probes }: Knowledge, work: Work): FreeSpace | undefined {
  const { nColumns, column } = e.rows
  if (e.free.length * nColumns > MOST_NUMBERS || !work.take(e.free.length * column.length)) return undefined
  const size = particular.value.map((value, j) =>
    probes.reduce((most, h) => Math.max(most, Math.abs(h.value[j] as number)), Math.abs(value)),
  )
  const directions = e.free.map((free) => {
    const factor = size[free] || 1
    return directionOf(e, free).map((value) => factor * value)
  })
  return { point: particular.value, directions, size: size.map((value) => value || 1) }
}

/**
 * The same seen in a few columns only: in place of all directions as many as move these columns independently, each named
 * by the column that it moves by its size alone.
 */
export type LocalSpace = {
  nFree: number
  /** Entries of a form that must be 0: one for each direction, then the constant; and what each was made of. */
  row: (form: LinearForm) => { entries: Float64Array; terms: number }
}

/** undefined where it cannot be told which directions are independent. */
export function localSpace(space: FreeSpace, columns: readonly number[]): LocalSpace | undefined {
  const { point, directions, size } = space
  const place = new Map(columns.map((column, k) => [column, k]))
  const rows = directions.flatMap((h) => {
    const its = columns.map((j) => (h[j] as number) / (size[j] as number))
    const most = its.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0)
    return most === 0 ? [] : [its.map((value) => value / most)]
  })
  const { rows: basis, sure, rank } = reduce(rows, columns.length)
  if (!sure) return undefined
  return {
    nFree: rank,
    row: ({ columns: its, coefficients, constant }) => {
      const entries = new Float64Array(rank + 1)
      const made = new Float64Array(rank + 1)
      entries[rank] = constant
      made[rank] = Math.abs(constant)
      its.forEach((column, q) => {
        const at = place.get(column) as number
        const factor = coefficients[q] as number
        const fixed = factor * (point[column] as number)
        entries[rank]! += fixed
        made[rank]! += Math.abs(fixed)
        const moved = factor * (size[column] as number)
        for (let k = 0; k < rank; k++) {
          const term = moved * ((basis[k] as Float64Array)[at] as number)
          entries[k]! += term
          made[k]! += Math.abs(term)
        }
      })
      let terms = 0
      for (let k = 0; k <= rank; k++) terms = Math.max(terms, made[k] as number)
      return { entries, terms }
    },
  }
}
