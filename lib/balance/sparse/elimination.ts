import type { CompiledRows } from './compiled-rows'
import { type CoreFactors, eliminateCore } from './core'
import { equilibrate } from './equilibrate'
import { type Peeled, peel } from './peel'

/**
 * Rows taken apart in three parts: columns found by substitution (`peeled`), the core eliminated by pivots, and columns
 * that stand in one remaining row only (`single`), found last. Columns in none of the three are free.
 */
export type Elimination = {
  rows: CompiledRows
  peeled: Peeled
  /** Rows and columns of the third part, in the order taken off; values follow in the opposite order. */
  singleRow: number[]
  singleColumn: number[]
  core: CoreFactors
  /** Global row and column of each local one of the core, and their scales (powers of two). */
  coreRow: number[]
  coreColumn: number[]
  rowScale: Float64Array
  columnScale: Float64Array
  /** Ascending. */
  free: number[]
  /** Rows that follow from the others, if they hold at all; ascending. */
  dependent: number[]
  rank: number
}

/** Finds rank, pivots, free columns and dependent rows of a set of rows. */
export function eliminate(rows: CompiledRows, nonNegative: Uint8Array): Elimination {
  const { nRows, nColumns, start, column, value, columnStart, rowOfEntry } = rows
  const peeled = peel(rows, nonNegative)
  const settled = Uint8Array.from(peeled.known)
  const rowDone = new Uint8Array(nRows)
  const dependent: number[] = []
  const inRows = new Int32Array(nColumns)
  for (let i = 0; i < nRows; i++) {
    if (peeled.used[i] || peeled.left[i] === 0) {
      rowDone[i] = 1
      if (!peeled.used[i]) dependent.push(i)
      continue
    }
    for (let k = start[i] as number; k < (start[i + 1] as number); k++)
      if (!settled[column[k] as number]) inRows[column[k] as number]!++
  }

  const singleRow: number[] = []
  const singleColumn: number[] = []
  const queue: number[] = []
  for (let j = 0; j < nColumns; j++) if (!settled[j] && inRows[j] === 1) queue.push(j)
  for (let q = 0; q < queue.length; q++) {
    const j = queue[q] as number
    if (settled[j] || inRows[j] !== 1) continue
    let at = columnStart[j] as number
    while (rowDone[rowOfEntry[at] as number]) at++
    const i = rowOfEntry[at] as number
    rowDone[i] = 1
    settled[j] = 1
    singleRow.push(i)
    singleColumn.push(j)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const other = column[k] as number
      if (!settled[other] && --inRows[other]! === 1) queue.push(other)
    }
  }

  const coreRow: number[] = []
  for (let i = 0; i < nRows; i++) if (!rowDone[i]) coreRow.push(i)
  const coreColumn: number[] = []
  const local = new Int32Array(nColumns).fill(-1)
  const knownSize: number[] = []
  let largest = 0
  for (let i = 0; i < nRows; i++) largest = Math.max(largest, Math.abs(rows.rhs[i] as number))
  const columns: number[][] = []
  const values: number[][] = []
  for (const i of coreRow) {
    const its: number[] = []
    const theirs: number[] = []
    let size = Math.abs(rows.rhs[i] as number)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      if (peeled.known[j]) size += Math.abs((value[k] as number) * (peeled.value[j] as number))
      if (settled[j]) continue
      if (local[j] === -1) local[j] = coreColumn.push(j) - 1
      its.push(local[j] as number)
      theirs.push(value[k] as number)
    }
    columns.push(its)
    values.push(theirs)
    knownSize.push(size)
  }
  const { rowScale, columnScale } = equilibrate(columns, values, coreColumn.length, knownSize, largest || 1)
  const core = eliminateCore(
    columns,
    values,
    coreColumn.length,
    knownSize.map((size, r) => size * (rowScale[r] as number)),
  )
  for (const r of core.dependent) dependent.push(coreRow[r] as number)
  for (const c of core.pivotColumn) settled[coreColumn[c] as number] = 1
  const free: number[] = []
  for (let j = 0; j < nColumns; j++) if (!settled[j]) free.push(j)
  return {
    rows,
    peeled,
    singleRow,
    singleColumn,
    core,
    coreRow,
    coreColumn,
    rowScale,
    columnScale,
    free,
    dependent: dependent.sort((a, b) => a - b),
    rank: nColumns - free.length,
  }
}
