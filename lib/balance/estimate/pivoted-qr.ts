/**
 * Householder factors Q R of a dense matrix with column pivoting (Golub, Numer. Math. 7, 1965), which show its rank.
 * Symbols: m rows, n columns, `rank` r; R is r x n in pivoted order, row k at `r[k * n]`; reflector k acts on rows k to m.
 */
export type PivotedQr = {
  m: number
  n: number
  rank: number
  /** Pivoted place -> column, length n. */
  order: Int32Array
  /** r x n by rows, upper triangular in its first r columns. */
  r: Float64Array
  reflectors: Float64Array[]
}

/** Columns (each of length m, overwritten) whose rest is below `tolerance` of their own length count as dependent. */
export function pivotedQr(columns: Float64Array[], m: number, tolerance: number): PivotedQr {
  const n = columns.length
  const order = Int32Array.from({ length: n }, (_, j) => j)
  const own = columns.map((column) => norm(column, 0))
  const rest = own.slice()
  const reflectors: Float64Array[] = []
  const rRows: Float64Array[] = []
  let rank = 0
  for (; rank < Math.min(m, n); rank++) {
    let best = -1
    let largest = 0
    for (let k = rank; k < n; k++) {
      const j = order[k] as number
      const length = rest[j] as number
      if (length > tolerance * (own[j] as number) && length > largest) {
        largest = length
        best = k
      }
    }
    if (best < 0) break
    const j = order[best] as number
    const exact = norm(columns[j] as Float64Array, rank)
    if (exact <= tolerance * (own[j] as number)) {
      rest[j] = exact
      rank--
      continue
    }
    order[best] = order[rank] as number
    order[rank] = j
    const pivot = columns[j] as Float64Array
    const reflector = pivot.slice(rank)
    reflector[0]! += (reflector[0] as number) >= 0 ? exact : -exact
    const length = norm(reflector, 0)
    for (let i = 0; i < reflector.length; i++) reflector[i]! /= length
    reflectors.push(reflector)
    for (let k = rank; k < n; k++) {
      const column = columns[order[k] as number] as Float64Array
      reflect(reflector, column, rank)
      if (k > rank)
        rest[order[k] as number] = downdated(
          rest[order[k] as number] as number,
          column,
          rank,
          own[order[k] as number] as number,
        )
    }
  }
  for (let k = 0; k < rank; k++)
    rRows.push(
      Float64Array.from({ length: n }, (_, at) =>
        at < k ? 0 : ((columns[order[at] as number] as Float64Array)[k] as number),
      ),
    )
  const r = new Float64Array(rank * n)
  rRows.forEach((row, k) => {
    r.set(row, k * n)
  })
  return { m, n, rank, order, r, reflectors }
}

/** Length of what is left of a column after one more row is taken; worked out anew where the difference loses digits. */
function downdated(before: number, column: Float64Array, row: number, own: number): number {
  const taken = column[row] as number
  const square = before * before - taken * taken
  return square > 1e-4 * before * before && before > 1e-6 * own ? Math.sqrt(square) : norm(column, row + 1)
}

function norm(x: Float64Array, from: number): number {
  let largest = 0
  for (let i = from; i < x.length; i++) largest = Math.max(largest, Math.abs(x[i] as number))
  if (largest === 0) return 0
  let sum = 0
  for (let i = from; i < x.length; i++) sum += ((x[i] as number) / largest) ** 2
  return largest * Math.sqrt(sum)
}

function reflect(reflector: Float64Array, x: Float64Array, from: number): void {
  let along = 0
  for (let i = 0; i < reflector.length; i++) along += (reflector[i] as number) * (x[from + i] as number)
  if (along === 0) return
  for (let i = 0; i < reflector.length; i++) x[from + i]! -= 2 * along * (reflector[i] as number)
}

/** Q'b, in place (length m). */
function applyQTransposed({ reflectors }: PivotedQr, b: Float64Array): void {
  reflectors.forEach((reflector, k) => {
    reflect(reflector, b, k)
  })
}

/** A least squares solution (length n) of the factored columns for b (length m, overwritten); what is free stays 0. */
export function leastSquares(qr: PivotedQr, b: Float64Array): Float64Array {
  const { rank, n, r, order } = qr
  applyQTransposed(qr, b)
  const x = new Float64Array(n)
  for (let k = rank - 1; k >= 0; k--) {
    let sum = b[k] as number
    for (let at = k + 1; at < rank; at++) sum -= (r[k * n + at] as number) * (x[order[at] as number] as number)
    x[order[k] as number] = sum / (r[k * n + k] as number)
  }
  return x
}

/** a with R11' a = g on the first `rank` pivoted places (g by column, length n): how a gradient rests on the rows. */
export function onRows({ rank, n, r, order }: PivotedQr, g: Float64Array): Float64Array {
  const a = new Float64Array(rank)
  for (let k = 0; k < rank; k++) a[k] = g[order[k] as number] as number
  for (let k = 0; k < rank; k++) {
    const value = (a[k] as number) / (r[k * n + k] as number)
    a[k] = value
    if (value === 0) continue
    for (let at = k + 1; at < rank; at++) a[at]! -= value * (r[k * n + at] as number)
  }
  return a
}

/** Largest part of a gradient, relative to its terms, that the rows do not span: 0 where they do. */
export function offRows({ rank, n, r, order }: PivotedQr, g: Float64Array, a: Float64Array): number {
  let worst = 0
  let size = 0
  for (let at = 0; at < n; at++) size = Math.max(size, Math.abs(g[order[at] as number] as number))
  if (size === 0) return 0
  for (let at = rank; at < n; at++) {
    let rest = g[order[at] as number] as number
    let terms = Math.abs(rest)
    for (let k = 0; k < rank; k++) {
      const part = (a[k] as number) * (r[k * n + at] as number)
      rest -= part
      terms += Math.abs(part)
    }
    worst = Math.max(worst, Math.abs(rest) / Math.max(size, terms * 1e-6))
  }
  return worst
}
