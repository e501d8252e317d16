import type { Elimination } from './elimination'
import { NOTHING } from './peel'

/** In a probe, what is left of an entry below this part of its terms does not move. */
export const MOVES = 1e-9

/** x (length nColumns) with every pivot row met for `rhs` (by row) and the free columns at `free` (0 when left out). */
export function applyInverse(e: Elimination, rhs: Float64Array, free?: Float64Array): Float64Array {
  const { start, column, value, nColumns } = e.rows
  const x = free ? Float64Array.from(free) : new Float64Array(nColumns)
  const { rows: peeledRows, columns: peeledColumns } = e.peeled
  for (let q = 0; q < peeledRows.length; q++) {
    const i = peeledRows[q] as number
    const j = peeledColumns[q] as number
    x[j] = 0
    if (i >= 0) x[j] = solveRowFor(e, i, j, rhs[i] as number, x)
  }
  const { coreRow, coreColumn, rowScale, columnScale, core } = e
  const w = new Float64Array(coreRow.length)
  for (let r = 0; r < coreRow.length; r++) {
    const i = coreRow[r] as number
    let rest = rhs[i] as number
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      if (e.peeled.known[j]) rest -= (value[k] as number) * (x[j] as number)
    }
    w[r] = rest * (rowScale[r] as number)
  }
  for (let q = 0; q < core.target.length; q++)
    w[core.target[q] as number]! -= (core.factor[q] as number) * (w[core.source[q] as number] as number)
  for (let q = core.pivotRow.length - 1; q >= 0; q--) {
    const r = core.pivotRow[q] as number
    const its = core.columns[r] as number[]
    const u = core.values[r] as number[]
    let rest = w[r] as number
    for (let k = 0; k < its.length; k++) {
      const c = its[k] as number
      rest -= ((u[k] as number) * (x[coreColumn[c] as number] as number)) / (columnScale[c] as number)
    }
    const c = core.pivotColumn[q] as number
    x[coreColumn[c] as number] = (rest / (core.pivotValue[q] as number)) * (columnScale[c] as number)
  }
  for (let q = e.singleRow.length - 1; q >= 0; q--) {
    const i = e.singleRow[q] as number
    const j = e.singleColumn[q] as number
    x[j] = 0
    x[j] = solveRowFor(e, i, j, rhs[i] as number, x)
  }
  return x
}

/** The column j that closes row i; what is left after cancelling counts as 0 below `NOTHING` of its terms. */
function solveRowFor(e: Elimination, i: number, j: number, rhs: number, x: Float64Array): number {
  const { start, column, value } = e.rows
  let rest = rhs
  let terms = Math.abs(rhs)
  let pivot = 0
  for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
    if (column[k] === j) pivot = value[k] as number
    else {
      const term = (value[k] as number) * (x[column[k] as number] as number)
      rest -= term
      terms += Math.abs(term)
    }
  }
  return Math.abs(rest) <= NOTHING * terms ? 0 : rest / pivot
}

/** rhs - A x on the rows that were used as pivots, 0 elsewhere. */
function pivotResidual(e: Elimination, rhs: Float64Array | undefined, x: Float64Array): Float64Array {
  const residual = new Float64Array(e.rows.nRows)
  const put = (i: number): void => {
    let rest = rhs ? (rhs[i] as number) : 0
    for (let k = e.rows.start[i] as number; k < (e.rows.start[i + 1] as number); k++)
      rest -= (e.rows.value[k] as number) * (x[e.rows.column[k] as number] as number)
    residual[i] = rest
  }
  for (const r of e.core.pivotRow) put(e.coreRow[r] as number)
  for (const i of e.singleRow) put(i)
  return residual
}

/** The particular solution with all free columns 0, refined against the original rows. */
export function solveParticular(e: Elimination): Float64Array {
  const x = applyInverse(e, e.rows.rhs)
  for (const [q, j] of e.peeled.columns.entries())
    if (e.peeled.rows[q] !== undefined) x[j] = e.peeled.value[j] as number
  if (e.core.pivotRow.length > 0) {
    snap(e, x)
    const change = applyInverse(e, pivotResidual(e, e.rows.rhs, x))
    for (let j = 0; j < x.length; j++) if (x[j] !== 0) x[j]! += change[j] as number
    snap(e, x)
  }
  return x
}

/** Values found by elimination that cancel to nothing beside the terms they are made of are 0. */
function snap(e: Elimination, x: Float64Array): void {
  const { start, column, value, rhs } = e.rows
  const { core, coreRow, coreColumn, rowScale, columnScale } = e
  const sizes = new Float64Array(coreRow.length)
  for (let r = 0; r < coreRow.length; r++) {
    const i = coreRow[r] as number
    let size = Math.abs(rhs[i] as number)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      if (e.peeled.known[j]) size += Math.abs((value[k] as number) * (x[j] as number))
    }
    sizes[r] = size * (rowScale[r] as number)
  }
  for (let q = 0; q < core.target.length; q++)
    sizes[core.target[q] as number]! += Math.abs(core.factor[q] as number) * (sizes[core.source[q] as number] as number)
  for (let q = core.pivotRow.length - 1; q >= 0; q--) {
    const r = core.pivotRow[q] as number
    const its = core.columns[r] as number[]
    const u = core.values[r] as number[]
    let terms = sizes[r] as number
    for (let k = 0; k < its.length; k++) {
      const c = its[k] as number
      terms += Math.abs(((u[k] as number) * (x[coreColumn[c] as number] as number)) / (columnScale[c] as number))
    }
    const c = core.pivotColumn[q] as number
    const j = coreColumn[c] as number
    const own = Math.abs((core.pivotValue[q] as number) * (x[j] as number)) / (columnScale[c] as number)
    if (own <= 10 * NOTHING * terms) x[j] = 0
  }
  for (let q = e.singleRow.length - 1; q >= 0; q--) {
    const i = e.singleRow[q] as number
    const j = e.singleColumn[q] as number
    let terms = Math.abs(rhs[i] as number)
    let pivot = 0
    for (let k = start[i] as number; k < (start[i + 1] as number); k++)
      if (column[k] === j) pivot = value[k] as number
      else terms += Math.abs((value[k] as number) * (x[column[k] as number] as number))
    if (Math.abs(pivot * (x[j] as number)) <= 10 * NOTHING * terms) x[j] = 0
  }
}

/**
 * One direction in which the rows leave the solution free: independent random values in the free columns, the rest
 * following. A column that does not move is exactly 0. Peeled columns never move.
 */
export function probe(e: Elimination, random: () => number): Float64Array {
  const { start, column, value, nColumns } = e.rows
  const h = new Float64Array(nColumns)
  for (const j of e.free) h[j] = (0.5 + random()) * (random() < 0.5 ? -1 : 1)
  const { coreColumn, columnScale, core } = e
  const still = new Uint8Array(nColumns)
  for (let q = core.pivotRow.length - 1; q >= 0; q--) {
    const r = core.pivotRow[q] as number
    const its = core.columns[r] as number[]
    const u = core.values[r] as number[]
    let sum = 0
    let terms = 0
    for (let k = 0; k < its.length; k++) {
      const c = its[k] as number
      const term = ((u[k] as number) * (h[coreColumn[c] as number] as number)) / (columnScale[c] as number)
      sum -= term
      terms += Math.abs(term)
    }
    const c = core.pivotColumn[q] as number
    const j = coreColumn[c] as number
    if (Math.abs(sum) <= MOVES * terms) still[j] = 1
    else h[j] = (sum / (core.pivotValue[q] as number)) * (columnScale[c] as number)
  }
  const singles = (): void => {
    for (let q = e.singleRow.length - 1; q >= 0; q--) {
      const i = e.singleRow[q] as number
      const j = e.singleColumn[q] as number
      let sum = 0
      let terms = 0
      let pivot = 0
      for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
        if (column[k] === j) pivot = value[k] as number
        else {
          const term = (value[k] as number) * (h[column[k] as number] as number)
          sum -= term
          terms += Math.abs(term)
        }
      }
      h[j] = Math.abs(sum) <= MOVES * terms ? 0 : sum / pivot
    }
  }
  singles()
  if (core.pivotRow.length > 0) {
    const change = applyInverse(e, pivotResidual(e, undefined, h))
    for (const c of core.pivotColumn) {
      const j = coreColumn[c] as number
      if (!still[j]) h[j]! += change[j] as number
    }
    singles()
  }
  return h
}

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
  const { core, coreRow, coreColumn, rowScale, columnScale } = e
  const local = coreColumn.map((j, c) => (w[j] as number) * (columnScale[c] as number))
  const localTerms = coreColumn.map((j, c) => (terms[j] as number) * (columnScale[c] as number))
  const z = new Float64Array(coreRow.length)
  for (let q = 0; q < core.pivotRow.length; q++) {
    const r = core.pivotRow[q] as number
    const c = core.pivotColumn[q] as number
    if (Math.abs(local[c] as number) <= MOVES * (localTerms[c] as number)) continue
    const factor = (local[c] as number) / (core.pivotValue[q] as number)
    z[r] = factor
    const its = core.columns[r] as number[]
    const u = core.values[r] as number[]
    for (let k = 0; k < its.length; k++) {
      const part = (u[k] as number) * factor
      local[its[k] as number]! -= part
      localTerms[its[k] as number]! += Math.abs(part)
    }
  }
  const zTerms = z.map(Math.abs)
  for (let q = core.target.length - 1; q >= 0; q--) {
    const part = (core.factor[q] as number) * (z[core.target[q] as number] as number)
    z[core.source[q] as number]! -= part
    zTerms[core.source[q] as number]! += Math.abs(part)
  }
  for (let r = 0; r < coreRow.length; r++)
    if (Math.abs(z[r] as number) > MOVES * (zTerms[r] as number))
      take(coreRow[r] as number, (z[r] as number) * (rowScale[r] as number))
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
