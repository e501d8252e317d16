/** Sweeps of bounds through the rows; each lets a bound travel one row further. */
const SWEEPS = 6
/** No flow is taken to be smaller than this part of the largest. */
const LEAST = 2 ** -50

/**
 * Scales the core in place so that an entry is about what its term weighs: columns by a bound on each flow's size, rows
 * so that their largest entry is 1. Every row bounds each of its unknowns by the sum of its other terms, starting from
 * `largest`; `known[i]` is the size of the known terms of row i. Without this a trace would be taken from a difference
 * of large flows though its fraction is typed. Scales are powers of two, so that no digit is lost.
 */
export function equilibrate(
  columns: readonly number[][],
  values: number[][],
  nColumns: number,
  known: readonly number[],
  largest: number,
): { rowScale: Float64Array; columnScale: Float64Array } {
  const size = new Float64Array(nColumns).fill(largest)
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    let changed = false
    columns.forEach((its, i) => {
      const row = values[i] as number[]
      let sum = known[i] as number
      for (let k = 0; k < its.length; k++) sum += Math.abs(row[k] as number) * (size[its[k] as number] as number)
      for (let k = 0; k < its.length; k++) {
        const j = its[k] as number
        const own = Math.abs(row[k] as number) * (size[j] as number)
        const bound = Math.max(((sum - own) / Math.abs(row[k] as number)) * (1 + 1e-9), LEAST * largest)
        if (sum - own < 0.5 * own) {
          size[j] = bound
          sum += Math.abs(row[k] as number) * bound - own
          changed = true
        }
      }
    })
    if (!changed) break
  }
  const powerOfTwo = (x: number): number => 2 ** Math.round(Math.log2(x))
  const columnScale = size.map(powerOfTwo)
  const rowScale = Float64Array.from(columns, (its, i) => {
    let most = 0
    its.forEach((j, k) => {
      most = Math.max(most, Math.abs((values[i] as number[])[k] as number) * (columnScale[j] as number))
    })
    return most > 0 ? powerOfTwo(1 / most) : 1
  })
  columns.forEach((its, i) => {
    const row = values[i] as number[]
    for (let k = 0; k < its.length; k++) row[k]! *= (rowScale[i] as number) * (columnScale[its[k] as number] as number)
  })
  return { rowScale, columnScale }
}
