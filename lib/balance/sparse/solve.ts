import type { CompiledRows } from './compiled-rows'
import type { Elimination } from './elimination'
import { NOTHING } from './peel'

/** In a probe, what is left of an entry below this part of its terms does not move. A trace of a part in 1e9 does. */
export const MOVES = 1e-11

/**
 * A point or direction in the unknowns with, for each, the size of the largest numbers that it was made of: a value far
 * below its size came out of a difference, and has lost as many digits. Both of length nColumns.
 */
export type Vector = { value: Float64Array; size: Float64Array }

/** x (length nColumns) with every pivot row met for `rhs` (by row) and all free columns 0; nothing is set to 0. */
export function applyInverse(e: Elimination, rhs: Float64Array): Float64Array {
  const x = new Float64Array(e.rows.nColumns)
  const { rows: peeledRows, columns: peeledColumns } = e.peeled
  let started = false
  for (let q = 0; q < peeledRows.length; q++) {
    const i = peeledRows[q] as number
    const j = peeledColumns[q] as number
    if (i < 0 || (!started && rhs[i] === 0)) continue
    started = true
    x[j] = closing(e.rows, i, j, rhs[i] as number, x)
  }
  backSubstitute(e, forward(e, rhs, x), x)
  for (let q = e.singleRow.length - 1; q >= 0; q--) {
    const i = e.singleRow[q] as number
    const j = e.singleColumn[q] as number
    x[j] = closing(e.rows, i, j, rhs[i] as number, x)
  }
  return x
}

/** Right-hand sides of the core rows, less what is known, taken through the elimination. */
function forward(e: Elimination, rhs: Float64Array, x: Float64Array): Float64Array {
  const { start, column, value } = e.rows
  const { core, coreRow, rowScale } = e
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
  return w
}

function backSubstitute(e: Elimination, w: Float64Array, x: Float64Array): void {
  const { core, coreColumn, columnScale } = e
  const { start, column, value, pivotRow, pivotColumn, pivotValue } = core
  for (let q = pivotRow.length - 1; q >= 0; q--) {
    let rest = w[pivotRow[q] as number] as number
    for (let k = start[q] as number; k < (start[q + 1] as number); k++) {
      const c = column[k] as number
      rest -= ((value[k] as number) * (x[coreColumn[c] as number] as number)) / (columnScale[c] as number)
    }
    const c = pivotColumn[q] as number
    x[coreColumn[c] as number] = (rest / (pivotValue[q] as number)) * (columnScale[c] as number)
  }
}

/** The value of column j that closes row i. */
function closing({ start, column, value }: CompiledRows, i: number, j: number, rhs: number, x: Float64Array): number {
  let rest = rhs
  let pivot = 0
  for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
    const at = column[k] as number
    if (at === j) pivot = value[k] as number
    else rest -= (value[k] as number) * (x[at] as number)
  }
  return rest / pivot
}

/** rhs - A x on the rows that were used as pivots of the core or for single columns, 0 elsewhere. */
function pivotResidual(e: Elimination, rhs: Float64Array | undefined, x: Float64Array): Float64Array {
  const residual = new Float64Array(e.rows.nRows)
  for (const r of e.core.pivotRow) residual[e.coreRow[r] as number] = rest(e.rows, e.coreRow[r] as number, rhs, x)
  for (const i of e.singleRow) residual[i] = rest(e.rows, i, rhs, x)
  return residual
}

/** What row i leaves of its right-hand side. */
function rest({ start, column, value }: CompiledRows, i: number, rhs: Float64Array | undefined, x: Float64Array) {
  let left = rhs ? (rhs[i] as number) : 0
  for (let k = start[i] as number; k < (start[i + 1] as number); k++)
    left -= (value[k] as number) * (x[column[k] as number] as number)
  return left
}

/** The particular solution with all free columns 0, refined against the original rows. */
export function solveParticular(e: Elimination): Vector {
  const x = Float64Array.from(e.peeled.value)
  const size = x.map(Math.abs)
  const known = coreSizes(e, x)
  settle(e, x, size, known, e.rows.rhs, NOTHING, forward(e, e.rows.rhs, x))
  refine(e, e.rows.rhs, x)
  settle(e, x, size, known, e.rows.rhs, NOTHING)
  return { value: x, size }
}

/**
 * One direction in which the rows leave the solution free: independent random values in the free columns, the rest
 * following. A column that does not move is exactly 0. Peeled columns never move.
 */
export function probe(e: Elimination, random: () => number, scale: number): Vector {
  const x = new Float64Array(e.rows.nColumns)
  for (const j of e.free) x[j] = scale * (0.5 + random()) * (random() < 0.5 ? -1 : 1)
  const size = x.map(Math.abs)
  const nothing = new Float64Array(e.coreRow.length)
  settle(e, x, size, nothing, undefined, MOVES, nothing)
  refine(e, undefined, x)
  settle(e, x, size, nothing, undefined, MOVES)
  return { value: x, size }
}

/** The direction of one free column alone, unscaled. */
export function directionOf(e: Elimination, column: number): Float64Array {
  const x = new Float64Array(e.rows.nColumns)
  x[column] = 1
  const nothing = new Float64Array(e.coreRow.length)
  settle(e, x, x.map(Math.abs), nothing, undefined, MOVES, nothing)
  return x
}

/** One step of iterative refinement; what is exactly 0 stays so. */
function refine(e: Elimination, rhs: Float64Array | undefined, x: Float64Array): void {
  if (e.core.pivotRow.length === 0) return
  const change = applyInverse(e, pivotResidual(e, rhs, x))
  for (const c of e.core.pivotColumn) {
    const j = e.coreColumn[c] as number
    if (x[j] !== 0) x[j]! += change[j] as number
  }
}

/** Sizes of the known terms of the core rows, taken through the elimination. */
function coreSizes(e: Elimination, x: Float64Array): Float64Array {
  const { start, column, value, rhs } = e.rows
  const { core, coreRow, rowScale } = e
  const sizes = new Float64Array(coreRow.length)
  for (let r = 0; r < coreRow.length; r++) {
    const i = coreRow[r] as number
    let size = Math.abs(rhs[i] as number)
    for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
      const j = column[k] as number
      if (e.peeled.known[j]) size = Math.max(size, Math.abs((value[k] as number) * (x[j] as number)))
    }
    sizes[r] = size * (rowScale[r] as number)
  }
  for (let q = 0; q < core.target.length; q++) {
    const target = core.target[q] as number
    const from = Math.abs(core.factor[q] as number) * (sizes[core.source[q] as number] as number)
    sizes[target] = Math.max(sizes[target] as number, from)
  }
  return sizes
}

/**
 * Goes through the unknowns in the order in which they were found, notes the size of what each was made of, and sets to
 * exactly 0 what is nothing beside its terms (`nothing`) or beside its size (`NOTHING`). Single columns are found here,
 * and those of the core too where their right-hand sides `w` are given: what is nothing must not reach the next.
 */
function settle(
  e: Elimination,
  x: Float64Array,
  size: Float64Array,
  known: Float64Array,
  rhs: Float64Array | undefined,
  nothing: number,
  w?: Float64Array,
): void {
  const { coreColumn, columnScale } = e
  const { start, column, value, pivotRow, pivotColumn, pivotValue } = e.core
  for (let q = pivotRow.length - 1; q >= 0; q--) {
    const r = pivotRow[q] as number
    let terms = known[r] as number
    let largest = known[r] as number
    let rest = w ? (w[r] as number) : 0
    for (let k = start[q] as number; k < (start[q + 1] as number); k++) {
      const c = column[k] as number
      const j = coreColumn[c] as number
      const a = (value[k] as number) / (columnScale[c] as number)
      const term = a * (x[j] as number)
      rest -= term
      terms += Math.abs(term)
      largest = Math.max(largest, Math.abs(a) * (size[j] as number))
    }
    const c = pivotColumn[q] as number
    const scale = columnScale[c] as number
    const pivot = pivotValue[q] as number
    if (w) x[coreColumn[c] as number] = (rest / pivot) * scale
    const over = Math.abs(pivot) / scale
    keep(x, size, coreColumn[c] as number, terms / over, largest / over, nothing)
  }
  for (let q = e.singleRow.length - 1; q >= 0; q--) {
    const i = e.singleRow[q] as number
    const j = e.singleColumn[q] as number
    settleSingle(e.rows, i, j, rhs ? (rhs[i] as number) : 0, x, size, nothing)
  }
}

/** Closes row i by column j, and notes the sizes of what its value was made of. */
function settleSingle(
  { start, column, value }: CompiledRows,
  i: number,
  j: number,
  rhs: number,
  x: Float64Array,
  size: Float64Array,
  nothing: number,
): void {
  let left = rhs
  let terms = Math.abs(rhs)
  let largest = terms
  let pivot = 0
  for (let k = start[i] as number; k < (start[i + 1] as number); k++) {
    const a = value[k] as number
    const at = column[k] as number
    if (at === j) {
      pivot = a
      continue
    }
    const term = a * (x[at] as number)
    left -= term
    terms += Math.abs(term)
    largest = Math.max(largest, Math.abs(a) * (size[at] as number))
  }
  const over = Math.abs(pivot)
  x[j] = left / pivot
  keep(x, size, j, terms / over, Math.max(largest, terms) / over, nothing)
}

function keep(x: Float64Array, size: Float64Array, j: number, terms: number, largest: number, nothing: number): void {
  const own = Math.abs(x[j] as number)
  const isNothing = own <= nothing * terms || own <= NOTHING * largest
  if (isNothing) x[j] = 0
  size[j] = isNothing ? 0 : Math.max(own, largest)
}
