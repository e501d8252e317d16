/**
 * Linear ties between the n mix factors of a space, reduced so that each of `tied` is given by the others: a point that
 * keeps them moves by `factor` of the free ones. Rows of `matrix` (one a tied place) have one entry a free place.
 */
export type Ties = {
  tied: number[]
  free: number[]
  /** tied x free: tied = offset - matrix x free. */
  matrix: Float64Array[]
  offset: number[]
  /** Rows that follow from others, or contradict them by this much of their terms. */
  leftOver: number
}

/** A row that is left below this part of its terms follows from the others. */
const INDEPENDENT = 1e-9

/** Reduces rows g . d = rhs (each g of length n, overwritten) by elimination with full pivoting, rows scaled alike. */
export function reduceTies(
  rows: Float64Array[],
  rhs: number[],
  n: number,
  scale: Float64Array,
  independent = INDEPENDENT,
): Ties {
  const b = [...rhs]
  const sizes = rows.map((row, i) => {
    let largest = 0
    for (let q = 0; q < n; q++) largest = Math.max(largest, Math.abs((row[q] as number) * (scale[q] as number)))
    if (largest > 0) {
      for (let q = 0; q < n; q++) row[q]! /= largest
      b[i]! /= largest
    }
    return largest
  })
  const waiting = new Set(rows.keys())
  for (const i of waiting) if (sizes[i] === 0) waiting.delete(i)
  const pivots: [row: number, place: number][] = []
  const taken = new Uint8Array(n)
  for (;;) {
    let best: [number, number] | undefined
    let size = independent
    for (const i of waiting) {
      const row = rows[i] as Float64Array
      for (let q = 0; q < n; q++) {
        if (taken[q]) continue
        const entry = Math.abs((row[q] as number) * (scale[q] as number))
        if (entry > size) {
          size = entry
          best = [i, q]
        }
      }
    }
    if (!best) break
    const [i, q] = best
    waiting.delete(i)
    taken[q] = 1
    pivots.push(best)
    const pivot = rows[i] as Float64Array
    const head = pivot[q] as number
    for (let k = 0; k < n; k++) pivot[k]! /= head
    b[i]! /= head
    rows.forEach((row, other) => {
      if (other === i || sizes[other] === 0) return
      const factor = row[q] as number
      if (factor === 0) return
      for (let k = 0; k < n; k++) row[k]! -= factor * (pivot[k] as number)
      row[q] = 0
      b[other]! -= factor * (b[i] as number)
    })
  }
  const free: number[] = []
  for (let q = 0; q < n; q++) if (!taken[q]) free.push(q)
  let leftOver = 0
  for (const i of waiting) leftOver = Math.max(leftOver, Math.abs(b[i] as number))
  return {
    tied: pivots.map(([, q]) => q),
    free,
    matrix: pivots.map(([i]) => Float64Array.from(free, (q) => (rows[i] as Float64Array)[q] as number)),
    offset: pivots.map(([i]) => b[i] as number),
    leftOver,
  }
}

/** A gradient over all places (length n) as one over the free places. */
export function onFree({ tied, free, matrix }: Ties, g: Float64Array): Float64Array {
  const its = Float64Array.from(free, (q) => g[q] as number)
  tied.forEach((q, t) => {
    const factor = g[q] as number
    if (factor === 0) return
    const row = matrix[t] as Float64Array
    for (let k = 0; k < its.length; k++) its[k]! -= factor * (row[k] as number)
  })
  return its
}

/** The whole move (length n) for a move of the free places; `withOffset` also closes the ties. */
export function wholeMove({ tied, free, matrix, offset }: Ties, move: Float64Array, withOffset: boolean): Float64Array {
  const d = new Float64Array(tied.length + free.length)
  free.forEach((q, k) => {
    d[q] = move[k] as number
  })
  tied.forEach((q, t) => {
    let value = withOffset ? (offset[t] as number) : 0
    const row = matrix[t] as Float64Array
    for (let k = 0; k < row.length; k++) value -= (row[k] as number) * (move[k] as number)
    d[q] = value
  })
  return d
}
