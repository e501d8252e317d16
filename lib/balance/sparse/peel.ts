import type { CompiledRows } from './compiled-rows'
import { RowHeap } from './row-heap'

/** What is left of a row counts as nothing below this part of the terms that it is made of. */
export const NOTHING = 1e-12

/** What is found by substitution alone, before any elimination. */
export type Peeled = {
  /** 1 where the column's value is found. */
  known: Uint8Array
  value: Float64Array
  /** Rows and columns in the order found; row -1 - i is a flow that must be 0 because the sum in row i is 0. */
  rows: number[]
  columns: number[]
  /** 1 where the row was used to find a column. */
  used: Uint8Array
  /** Unknown columns left in each row. */
  left: Int32Array
}

/**
 * Peels rows with one unknown, the best known first: each candidate carries a bound on its relative error (half-widths
 * of what was typed, through the row), and the least is taken, as in Knuth's generalisation of Dijkstra's algorithm
 * (Inf. Proc. Letters 6, 1977). So among redundant rows the well-conditioned ones give the values. When none is left, a
 * row of flows of one sign that must add up to 0 fixes each at 0. Never fails; inconsistent rows are simply left unused.
 */
export function peel(rows: CompiledRows, nonNegative: Uint8Array): Peeled {
  const { nRows, nColumns, start, column, value: a, rhs, relativeError, columnStart, rowOfEntry, placeOfEntry } = rows
  const known = new Uint8Array(nColumns)
  const used = new Uint8Array(nRows)
  const left = new Int32Array(nRows)
  const rest = Float64Array.from(rhs)
  const terms = new Float64Array(nRows)
  const error = new Float64Array(nRows)
  const x = new Float64Array(nColumns)
  const found: Peeled = { known, value: x, rows: [], columns: [], used, left }
  const heap = new RowHeap(nRows)
  const zeroSums: number[] = []

  const isNothing = (i: number): boolean => Math.abs(rest[i] as number) <= NOTHING * (terms[i] as number)
  const propose = (i: number): void => {
    const total = (error[i] as number) + (relativeError[i] as number) * (terms[i] as number)
    // What cancels to nothing is known to no digit: it comes last, unless it is made of nothing.
    const size = Math.abs(rest[i] as number)
    heap.push(i, total === 0 ? 0 : isNothing(i) ? Number.MAX_VALUE : total / size)
  }
  const learn = (row: number, j: number, xj: number, errorOfX: number): void => {
    known[j] = 1
    x[j] = xj
    found.rows.push(row)
    found.columns.push(j)
    for (let k = columnStart[j] as number; k < (columnStart[j + 1] as number); k++) {
      const i = rowOfEntry[k] as number
      const aij = a[placeOfEntry[k] as number] as number
      rest[i]! -= aij * xj
      terms[i]! += Math.abs(aij * xj)
      error[i]! += Math.abs(aij) * errorOfX
      left[i]!--
      if (used[i]) continue
      if (left[i] === 1) propose(i)
      else if ((left[i] as number) > 1 && isNothing(i)) zeroSums.push(i)
    }
  }

  for (let i = 0; i < nRows; i++) {
    left[i] = (start[i + 1] as number) - (start[i] as number)
    terms[i] = Math.abs(rhs[i] as number)
    if (left[i] === 1) propose(i)
    else if (rhs[i] === 0) zeroSums.push(i)
  }
  for (;;) {
    const i = heap.pop()
    if (i >= 0) {
      if (left[i] !== 1) continue
      let place = start[i] as number
      while (known[column[place] as number]) place++
      used[i] = 1
      const pivot = a[place] as number
      const bound = ((error[i] as number) + (relativeError[i] as number) * (terms[i] as number)) / Math.abs(pivot)
      learn(i, column[place] as number, isNothing(i) ? 0 : (rest[i] as number) / pivot, bound)
      continue
    }
    const sum = zeroSums.pop()
    if (sum === undefined) break
    if ((left[sum] as number) < 2 || !isNothing(sum)) continue
    const unknown = oneSigned(rows, sum, known, nonNegative)
    for (const j of unknown ?? []) learn(-1 - sum, j, 0, 0)
  }
  return found
}

/** The unknown columns of a row where they are all flows of one sign, else undefined. */
function oneSigned(rows: CompiledRows, row: number, known: Uint8Array, nonNegative: Uint8Array): number[] | undefined {
  const unknown: number[] = []
  let sign = 0
  if (!rows.isSum[row]) return undefined
  for (let k = rows.start[row] as number; k < (rows.start[row + 1] as number); k++) {
    const j = rows.column[k] as number
    if (known[j]) continue
    const its = Math.sign(rows.value[k] as number)
    if (!nonNegative[j] || (sign !== 0 && its !== sign)) return undefined
    sign = its
    unknown.push(j)
  }
  return unknown
}
