import type { CoreRows } from './core'

/** Sweeps of bounds through the rows; each lets a bound travel one row further. */
const SWEEPS = 6
/** No flow is taken to be smaller than this part of the largest. */
const LEAST = 2 ** -50

/**
 * Scales the core in place so that an entry is about what its term weighs: columns by a bound on each flow's size, rows
 * so that their largest entry is 1. Every row bounds each of its unknowns by the sum of its other terms, starting from
 * `largest`; `knownSize` is that of the known terms of each row. Without this a trace would be taken from a difference
 * of large flows though its fraction is typed. Scales are powers of two, so that no digit is lost.
 */
export function equilibrate(
  { nRows, nColumns, start, column, value, knownSize }: CoreRows,
  largest: number,
): { rowScale: Float64Array; columnScale: Float64Array } {
  const size = new Float64Array(nColumns).fill(largest)
  let changed = true
  for (let sweep = 0; sweep < SWEEPS && changed; sweep++) {
    changed = false
    for (let i = 0; i < nRows; i++) {
      const from = start[i] as number
      const to = start[i + 1] as number
      let sum = knownSize[i] as number
      for (let k = from; k < to; k++) sum += Math.abs(value[k] as number) * (size[column[k] as number] as number)
      for (let k = from; k < to; k++) {
        const j = column[k] as number
        const coefficient = Math.abs(value[k] as number)
        const own = coefficient * (size[j] as number)
        if (sum - own >= 0.5 * own) continue
        const bound = Math.max(((sum - own) / coefficient) * (1 + 1e-9), LEAST * largest)
        size[j] = bound
        sum += coefficient * bound - own
        changed = true
      }
    }
  }
  const columnScale = new Float64Array(nColumns)
  for (let j = 0; j < nColumns; j++) columnScale[j] = powerOfTwo(size[j] as number)
  const rowScale = new Float64Array(nRows)
  for (let i = 0; i < nRows; i++) {
    const from = start[i] as number
    const to = start[i + 1] as number
    let most = 0
    for (let k = from; k < to; k++)
      most = Math.max(most, Math.abs(value[k] as number) * (columnScale[column[k] as number] as number))
    const scale = most > 0 ? powerOfTwo(1 / most) : 1
    rowScale[i] = scale
    for (let k = from; k < to; k++) value[k]! *= scale * (columnScale[column[k] as number] as number)
  }
  return { rowScale, columnScale }
}

const powerOfTwo = (x: number): number => 2 ** Math.round(Math.log2(x))
