/** Small dense matrices as rows. All functions leave what they are given as it is. */
export type Dense = readonly (readonly number[])[]

/** Pivots below this part of a row are rounding, above the next they are sure; between the two nobody can tell. */
export const ROUNDING = 1e-10
export const SURE = 1e-8

export type Reduced = {
  rank: number
  /** Rows and columns of the pivots, in the order taken. */
  pivotRows: number[]
  pivotColumns: number[]
  /** Each pivot row reduced to 1 at its pivot and 0 at the others, in the order of `pivotRows`. */
  rows: Float64Array[]
  /** Rows that hold no pivot, reduced. */
  rest: Float64Array[]
  /** False where a pivot was neither clearly something nor clearly nothing. */
  sure: boolean
}

/**
 * Gauss-Jordan elimination with complete pivoting among the first `nColumns` columns. The caller scales the rows, so that
 * an entry of 1 is as large as what the row is made of.
 */
export function reduce(matrix: Dense, nColumns: number): Reduced {
  const rows = matrix.map((row) => Float64Array.from(row))
  const pivotRows: number[] = []
  const pivotColumns: number[] = []
  const taken = new Uint8Array(rows.length)
  const used = new Uint8Array(nColumns)
  let sure = true
  for (;;) {
    let size = 0
    let row = -1
    let column = -1
    for (let i = 0; i < rows.length; i++) {
      if (taken[i]) continue
      const its = rows[i] as Float64Array
      for (let j = 0; j < nColumns; j++) {
        const value = Math.abs(its[j] as number)
        if (value <= size || used[j]) continue
        size = value
        row = i
        column = j
      }
    }
    if (row < 0 || size < SURE) {
      if (size > ROUNDING) sure = false
      break
    }
    taken[row] = 1
    used[column] = 1
    pivotRows.push(row)
    pivotColumns.push(column)
    clear(rows, row, column)
  }
  return {
    rank: pivotRows.length,
    pivotRows,
    pivotColumns,
    rows: pivotRows.map((i) => rows[i] as Float64Array),
    rest: rows.filter((_, i) => !taken[i]),
    sure,
  }
}

/** Divides a row by its pivot and takes it from all others. */
function clear(rows: Float64Array[], row: number, column: number): void {
  const pivot = rows[row] as Float64Array
  const head = pivot[column] as number
  for (let k = 0; k < pivot.length; k++) pivot[k]! /= head
  pivot[column] = 1
  for (let i = 0; i < rows.length; i++) {
    if (i === row) continue
    const its = rows[i] as Float64Array
    const factor = its[column] as number
    if (factor === 0) continue
    for (let k = 0; k < its.length; k++) its[k]! -= factor * (pivot[k] as number)
    its[column] = 0
  }
}

/** Sign and logarithm of the size of a determinant, by elimination with partial pivoting; sign 0 where it is 0. */
export function determinant(matrix: Dense): { sign: number; log: number } {
  const n = matrix.length
  const rows: Float64Array[] = matrix.map((row) => Float64Array.from(row))
  let sign = 1
  let log = 0
  for (let k = 0; k < n; k++) {
    let best = k
    for (let i = k + 1; i < n; i++) if (Math.abs(rows[i]![k]!) > Math.abs(rows[best]![k]!)) best = i
    if (best !== k) {
      ;[rows[k], rows[best]] = [rows[best] as Float64Array, rows[k] as Float64Array]
      sign = -sign
    }
    const pivot = rows[k] as Float64Array
    const head = pivot[k] as number
    if (head === 0 || !Number.isFinite(head)) return { sign: 0, log: Number.NEGATIVE_INFINITY }
    if (head < 0) sign = -sign
    log += Math.log(Math.abs(head))
    for (let i = k + 1; i < n; i++) {
      const its = rows[i] as Float64Array
      const factor = (its[k] as number) / head
      if (factor === 0) continue
      for (let j = k + 1; j < n; j++) its[j]! -= factor * (pivot[j] as number)
    }
  }
  return { sign, log }
}
