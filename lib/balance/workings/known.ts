import type { Settled } from '../conflicts/find-conflicts'
import { combine, type LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import { CellState, type Solution } from '../solution'
import { forEachCell, type KeptCell, keepCell } from '../states/cells'
import type { BookRows, Row } from './book-rows'
import type { Use } from './step'

/** A cell that the exact answer knows and that no step has found yet, with the form that is 0 (or fixed) when it is. */
export type Target = { cell: KeptCell; form: LinearForm }

/** What the steps so far have made known, beside what the exact answer knows. */
export type Known = {
  /** 1 where the column's value is known; length nColumns. */
  column: Uint8Array
  /** Its value, NaN where the answer has none; length nColumns. */
  value: Float64Array
  /** The typed value that makes a column known, where one does directly. */
  origin: (Use | undefined)[]
  /** By stream: ratios found earlier, as rows. */
  ratios: Row[][]
  /** By stream: cells still to be found. */
  targets: Target[][]
  /** Reactions whose extent is still to be found. */
  extents: Set<number>
  /** How large each column is, and 1 where it is a flow of exactly 0; length nColumns. */
  size: Float64Array
  isZero: Uint8Array
  streamId: (stream: number) => string
}

/** The typed values that make these columns known. */
export const origins = (known: Known, columns: readonly number[]): Use[] =>
  columns.map((j) => known.origin[j]).filter((use) => use !== undefined)

/** Known at the start: what was typed as such, column by column. */
export function knownAtStart(model: Model, settled: Settled, solution: Solution, book: BookRows): Known {
  const { generic } = settled.resolved.knowledge
  const known: Known = {
    column: new Uint8Array(model.nColumns),
    value: new Float64Array(model.nColumns).fill(Number.NaN),
    origin: new Array(model.nColumns),
    ratios: Array.from({ length: model.nStreams }, () => []),
    targets: Array.from({ length: model.nStreams }, () => []),
    extents: new Set(),
    size: new Float64Array(model.nColumns),
    isZero: new Uint8Array(model.nColumns),
    streamId: (s) => model.problem.streams[s]?.id as string,
  }
  const typical = typicalFlow(generic.value)
  for (let j = 0; j < model.nColumns; j++) known.size[j] = Math.abs(generic.value[j] as number) || typical
  const { states, values } = solution
  forEachCell(model, (cell) => {
    const { slot, stream, measure } = cell
    const value = values[slot] as number
    const { numerator, denominator } = measure
    const j = numerator.columns[0]
    if (!denominator && numerator.columns.length === 1 && j !== undefined) {
      const own = value / (numerator.coefficients[0] as number)
      if (value === 0) known.isZero[j] = 1
      else if (!Number.isNaN(value)) known.size[j] = Math.abs(own)
      // A given shows what was typed; the rows may hold a value that agrees with others within its rounding.
      known.value[j] = states[slot] === CellState.given ? (generic.value[j] as number) : own
    }
    if (states[slot] !== CellState.solvable) return
    known.targets[stream]?.push({
      cell: keepCell(cell),
      form: denominator ? combine(1, numerator, -value, denominator) : numerator,
    })
  })
  for (let s = 0; s < model.nStreams; s++)
    for (const { columns, uses } of book.givens[s] as Row[])
      if (columns.length === 1) markColumn(known, columns[0] as number, uses[0])
  for (const [r, extent] of solution.extents.entries()) {
    const column = model.extentColumn[r] as number
    if (extent.value !== undefined && extent.value !== 0) known.size[column] = Math.abs(extent.value)
    if (extent.state === 'solvable') known.extents.add(r)
    if (extent.state !== 'given') continue
    const rule = book.rules.find(({ columns }) => columns.length === 1 && columns[0] === column)
    if (rule) markColumn(known, column, rule.uses[0])
  }
  return known
}

export function markColumn(known: Known, column: number, origin?: Use): void {
  if (known.column[column]) return
  known.column[column] = 1
  known.origin[column] = origin
}

/** True where every column of a stream is known. */
export function isKnownStream(model: Model, known: Known, stream: number): boolean {
  const total = model.totalColumn[stream] as number
  const other = model.otherTotalColumn[stream] as number
  if ((total >= 0 && !known.column[total]) || (other >= 0 && !known.column[other])) return false
  return (model.present[stream] as number[]).every(
    (c) => known.column[model.flowColumn[stream * model.nComponents + c] as number],
  )
}

/** Geometric mean of what flows; a stand-in for the size of what does not. */
function typicalFlow(values: Float64Array): number {
  let sum = 0
  let count = 0
  for (const value of values)
    if (value !== 0) {
      sum += Math.log(Math.abs(value))
      count++
    }
  return count === 0 ? 1 : Math.exp(sum / count)
}

/** True for flows, which cannot be negative. */
export const isFlow = (model: Model, column: number): boolean =>
  (model.columnKind[column] as number) <= ColumnKind.otherTotal
