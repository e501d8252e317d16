import type { Elimination } from './elimination'
import { MOVES } from './solve'

/**
 * Multipliers y of the pivot rows (by row, length nRows) with y'A = `target` on every settled column: how a measure
 * follows from the rows. `misses` is true where the measure moves with a free column, so that no multipliers give it.
 */
export function solveTransposed(e: Elimination, target: Float64Array): { y: Float64Array; misses: boolean } {
  const { start, column, value, nRows } = e.rows
  const w = Float64Array.from(target)
  const terms = w.map(Math.abs)
  const y = new Float64Array(nRows)
  const take = (i: number, factor: number): void => {
    y[i]! += factor
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      const part = (value[k] as number) * factor
      w[j]! -= part
      terms[j]! += Math.abs(part)
    }
  }
  const isNothing = (j: number): boolean => Math.abs(w[j] as number) <= MOVES * (terms[j] as number)
  const pivotOf = (i: number, j: number): number => {
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) if (column[k] === j) return value[k] as number
    return 0
  }
  for (let q = 0; q < e.singleRow.length; q++) {
    const j = e.singleColumn[q] as number
    const i = e.singleRow[q] as number
    if (!isNothing(j)) take(i, (w[j] as number) / pivotOf(i, j))
  }
  const z = coreMultipliers(e, w, terms)
  for (let r = 0; r < z.length; r++)
    if (z[r] !== 0) take(e.coreRow[r] as number, (z[r] as number) * (e.rowScale[r] as number))
  let misses = false
  for (const j of e.free) if (!isNothing(j)) misses = true
  for (let q = e.peeled.rows.length - 1; q >= 0; q--) {
    const i = e.peeled.rows[q] as number
    const j = e.peeled.columns[q] as number
    if (isNothing(j)) continue
    // A flow fixed at 0 by a sum rests on the row of that sum.
    const from = i < 0 ? -1 - i : i
    take(from, (w[j] as number) / pivotOf(from, j))
  }
  return { y, misses }
}

/** Multipliers of the core rows as they stood before the elimination, in its scales; noise is 0. */
function coreMultipliers(e: Elimination, w: Float64Array, terms: Float64Array): Float64Array {
  const { core, coreRow, coreColumn, columnScale } = e
  const local = columnScale.map((scale, c) => (w[coreColumn[c] as number] as number) * scale)
  const localTerms = columnScale.map((scale, c) => (terms[coreColumn[c] as number] as number) * scale)
  const z = new Float64Array(coreRow.length)
  for (let q = 0; q < core.pivotRow.length; q++) {
    const r = core.pivotRow[q] as number
    const c = core.pivotColumn[q] as number
    if (Math.abs(local[c] as number) <= MOVES * (localTerms[c] as number)) continue
    const factor = (local[c] as number) / (core.pivotValue[q] as number)
    z[r] = factor
    for (let k = core.start[q] as number; k < (core.start[q + 1] as number); k++) {
      const part = (core.value[k] as number) * factor
      local[core.column[k] as number]! -= part
      localTerms[core.column[k] as number]! += Math.abs(part)
    }
  }
  const zTerms = z.map(Math.abs)
  for (let q = core.target.length - 1; q >= 0; q--) {
    const part = (core.factor[q] as number) * (z[core.target[q] as number] as number)
    z[core.source[q] as number]! -= part
    zTerms[core.source[q] as number]! += Math.abs(part)
  }
  return z.map((value, r) => (Math.abs(value) > MOVES * (zTerms[r] as number) ? value : 0))
}
