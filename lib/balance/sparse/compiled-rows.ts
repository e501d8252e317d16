import type { RowStore } from '../rows/row-store'

/**
 * Rows in compressed form, by row and by column: the entries of row i stand at `start[i]` to `start[i + 1]`, those of
 * column j at `columnStart[j]` to `columnStart[j + 1]` as (row, place in the row arrays).
 */
export type CompiledRows = {
  nRows: number
  nColumns: number
  start: Int32Array
  column: Int32Array
  value: Float64Array
  rhs: Float64Array
  /** Relative half-width of what the row holds; only orders the elimination. */
  relativeError: Float64Array
  /** 1 where the row is a sum of flows, so that a sum of 0 fixes each; not where it is a ratio. */
  isSum: Uint8Array
  columnStart: Int32Array
  rowOfEntry: Int32Array
  placeOfEntry: Int32Array
  /** Row of the store that each row came from. */
  stored: Int32Array
}

const EXACT = 1e-16

/** Compresses the rows that are in use (`use` left out: all). */
export function compileRows(store: RowStore, nColumns: number, use?: Uint8Array): CompiledRows {
  const kept: number[] = []
  let entries = 0
  for (let i = 0; i < store.count; i++)
    if (!use || use[i]) {
      kept.push(i)
      entries += (store.start[i + 1] as number) - (store.start[i] as number)
    }
  const nRows = kept.length
  const start = new Int32Array(nRows + 1)
  const column = new Int32Array(entries)
  const value = new Float64Array(entries)
  const rhs = new Float64Array(nRows)
  const relativeError = new Float64Array(nRows)
  const isSum = new Uint8Array(nRows)
  const columnStart = new Int32Array(nColumns + 1)
  let next = 0
  for (let i = 0; i < nRows; i++) {
    const from = kept[i] as number
    for (let k = store.start[from] as number; k < (store.start[from + 1] as number); k++) {
      column[next] = store.column[k] as number
      value[next] = store.value[k] as number
      columnStart[(store.column[k] as number) + 1]!++
      next++
    }
    start[i + 1] = next
    rhs[i] = store.rhs[from] as number
    const typed = store.typed[from]
    const kind = store.sources[store.source[from] as number]?.type
    const isSharp = !typed?.measure.denominator || typed.value === 0 || typed.value === 1
    isSum[i] = Number(typed ? isSharp : kind === 'definition' || kind === 'balance')
    relativeError[i] = typed ? (typed.value === 0 ? EXACT : typed.halfWidth / Math.abs(typed.value)) : EXACT
  }
  for (let j = 0; j < nColumns; j++) columnStart[j + 1]! += columnStart[j] as number
  const fill = columnStart.slice(0, nColumns)
  const rowOfEntry = new Int32Array(entries)
  const placeOfEntry = new Int32Array(entries)
  for (let i = 0; i < nRows; i++)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const at = fill[column[k] as number]!++
      rowOfEntry[at] = i
      placeOfEntry[at] = k
    }
  const stored = Int32Array.from(kept)
  return {
    nRows,
    nColumns,
    start,
    column,
    value,
    rhs,
    relativeError,
    isSum,
    columnStart,
    rowOfEntry,
    placeOfEntry,
    stored,
  }
}
