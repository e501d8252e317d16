import type { CompiledRows } from './compiled-rows'
import { type CoreRows, eliminateCore } from './core'
import type { CoreFactors } from './core-factors'
import { equilibrate } from './equilibrate'
import { type Peeled, peel } from './peel'
import type { PivotMemory } from './pivot-memory'

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
  coreRow: Int32Array
  coreColumn: Int32Array
  rowScale: Float64Array
  columnScale: Float64Array
  /** Ascending. */
  free: number[]
  /** Rows that follow from the others, if they hold at all; ascending. */
  dependent: number[]
  rank: number
}

/**
 * Finds rank, pivots, free columns and dependent rows of a set of rows. With a `memory`, pivots of the last time that
 * rows of the same pattern were eliminated are tried first, and what was found is remembered.
 */
export function eliminate(rows: CompiledRows, nonNegative: Uint8Array, memory?: PivotMemory): Elimination {
  const { nRows, nColumns } = rows
  const peeled = peel(rows, nonNegative)
  const settled = Uint8Array.from(peeled.known)
  const rowDone = new Uint8Array(nRows)
  const dependent: number[] = []
  for (let i = 0; i < nRows; i++) {
    if (!peeled.used[i] && peeled.left[i] !== 0) continue
    rowDone[i] = 1
    if (!peeled.used[i]) dependent.push(i)
  }
  const { singleRow, singleColumn } = takeSingles(rows, settled, rowDone)
  const { core: local, coreRow, coreColumn, largest } = coreOf(rows, peeled, settled, rowDone)
  const { rowScale, columnScale } = equilibrate(local, largest)
  for (let r = 0; r < local.nRows; r++) local.knownSize[r]! *= rowScale[r] as number
  const core = eliminateCore(local, memory?.recall(local))
  memory?.remember(local, core)
  for (const r of core.dependent) dependent.push(coreRow[r] as number)
  for (let q = 0; q < core.pivotColumn.length; q++) settled[coreColumn[core.pivotColumn[q] as number] as number] = 1
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

/** Takes off columns that stand in one row that is left, with that row, until there are none; marks both. */
function takeSingles(
  { nRows, nColumns, start, column, columnStart, rowOfEntry }: CompiledRows,
  settled: Uint8Array,
  rowDone: Uint8Array,
): { singleRow: number[]; singleColumn: number[] } {
  const inRows = new Int32Array(nColumns)
  for (let i = 0; i < nRows; i++) {
    if (rowDone[i]) continue
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) inRows[column[k] as number]!++
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
  return { singleRow, singleColumn }
}

/** The rows and columns that are left, numbered anew; `largest` is the largest right-hand side of all, 1 where all are 0. */
function coreOf(
  { nRows, nColumns, start, column, value, rhs }: CompiledRows,
  { known, value: x }: Peeled,
  settled: Uint8Array,
  rowDone: Uint8Array,
): { core: CoreRows; coreRow: Int32Array; coreColumn: Int32Array; largest: number } {
  let count = 0
  let entries = 0
  let largest = 0
  for (let i = 0; i < nRows; i++) {
    largest = Math.max(largest, Math.abs(rhs[i] as number))
    if (rowDone[i]) continue
    count++
    entries += (start[i + 1] as number) - (start[i] as number)
  }
  const coreRow = new Int32Array(count)
  const coreColumn = new Int32Array(nColumns)
  const local = new Int32Array(nColumns).fill(-1)
  const core: CoreRows = {
    nRows: count,
    nColumns: 0,
    start: new Int32Array(count + 1),
    column: new Int32Array(entries),
    value: new Float64Array(entries),
    knownSize: new Float64Array(count),
  }
  let r = 0
  let next = 0
  for (let i = 0; i < nRows; i++) {
    if (rowDone[i]) continue
    let size = Math.abs(rhs[i] as number)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      if (known[j]) size += Math.abs((value[k] as number) * (x[j] as number))
      if (settled[j]) continue
      if (local[j] === -1) {
        coreColumn[core.nColumns] = j
        local[j] = core.nColumns++
      }
      core.column[next] = local[j] as number
      core.value[next++] = value[k] as number
    }
    core.knownSize[r] = size
    coreRow[r++] = i
    core.start[r] = next
  }
  return { core, coreRow, coreColumn: coreColumn.subarray(0, core.nColumns), largest: largest || 1 }
}
