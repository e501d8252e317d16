import type { ColumnKind, Model } from '../model'
import { CellState, type ExtentResult, type Summary, slotOf } from '../solution'
import type { CompiledRows } from '../sparse/compiled-rows'
import { eliminate } from '../sparse/elimination'
import type { CellArrays } from './fill-cells'

/** Counts over the cells of the book's own basis: flow, component flows, fractions of present components. */
export function countCells(
  model: Model,
  { states }: CellArrays,
): Pick<Summary, 'given' | 'solvable' | 'unknown' | 'atOdds'> {
  const counts = { given: 0, solvable: 0, unknown: 0, atOdds: 0 }
  const count = (slot: number): void => {
    const state = states[slot]
    if (state === CellState.given) counts.given++
    else if (state === CellState.solvable) counts.solvable++
    else if (state === CellState.unknown) counts.unknown++
    else if (state === CellState.atOdds) counts.atOdds++
  }
  for (let s = 0; s < model.nStreams; s++) {
    count(slotOf(model.nComponents, s, 'flow'))
    for (const c of model.present[s] as number[]) {
      count(slotOf(model.nComponents, s, 'componentFlow', c))
      count(slotOf(model.nComponents, s, 'fraction', c))
    }
  }
  return counts
}

/** Freedom of the solution set in columns of the chosen kinds alone, all other columns held. */
export function freedomWithin(model: Model, rows: CompiledRows, kinds: readonly ColumnKind[]): number {
  const columns: number[] = []
  for (let j = 0; j < model.nColumns; j++) if (kinds.includes(model.columnKind[j] as ColumnKind)) columns.push(j)
  if (columns.length === 0) return 0
  return columns.length - eliminate(keepColumns(rows, columns), new Uint8Array(columns.length)).rank
}

/** The same rows with the chosen columns only and nothing on the right. */
function keepColumns(rows: CompiledRows, columns: number[]): CompiledRows {
  const place = new Map(columns.map((j, k) => [j, k]))
  const start = [0]
  const column: number[] = []
  const value: number[] = []
  for (let i = 0; i < rows.nRows; i++) {
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const at = place.get(rows.column[k] as number)
      if (at === undefined) continue
      column.push(at)
      value.push(rows.value[k] as number)
    }
    if (column.length > (start[start.length - 1] as number)) start.push(column.length)
  }
  const nRows = start.length - 1
  const columnStart = new Int32Array(columns.length + 1)
  for (const j of column) columnStart[j + 1]!++
  for (let j = 0; j < columns.length; j++) columnStart[j + 1]! += columnStart[j] as number
  const fill = columnStart.slice(0, columns.length)
  const rowOfEntry = new Int32Array(column.length)
  const placeOfEntry = new Int32Array(column.length)
  for (let i = 0; i < nRows; i++)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const at = fill[column[k] as number]!++
      rowOfEntry[at] = i
      placeOfEntry[at] = k
    }
  return {
    nRows,
    nColumns: columns.length,
    start: Int32Array.from(start),
    column: Int32Array.from(column),
    value: Float64Array.from(value),
    rhs: new Float64Array(nRows),
    relativeError: new Float64Array(nRows),
    isSum: new Uint8Array(nRows),
    columnStart,
    rowOfEntry,
    placeOfEntry,
    stored: new Int32Array(nRows),
  }
}

/** State and value of each reaction's extent. */
export function extentResults(
  model: Model,
  given: ReadonlyMap<number, number>,
  known: (column: number) => number | undefined,
): ExtentResult[] {
  return model.reactions.map(({ id }, r) => {
    const typed = given.get(r)
    if (typed !== undefined) return { reaction: id, state: 'given', value: typed }
    const value = known(model.extentColumn[r] as number)
    return value === undefined ? { reaction: id, state: 'unknown' } : { reaction: id, state: 'solvable', value }
  })
}
