/** Entries that cancel to less than this part of their terms are rounding and are dropped. */
const DROP = 1e-13
/** An entry below this part of its terms is not taken as a pivot while a better one is left. */
const DOUBTFUL = 1e-5
/** At the end, an entry below this part of its terms counts as 0: the row depends on the others. */
export const RANK_TOLERANCE = 2e-9
/** A pivot is at least this part of the largest entry of its row. */
const THRESHOLD = 0.1
/** Rows of least count that are looked at for each pivot. */
const CANDIDATES = 4

/** The factors of the rows that neither substitution nor single columns settle. Rows and columns are numbered locally. */
export type CoreFactors = {
  pivotRow: number[]
  pivotColumn: number[]
  pivotValue: number[]
  /** Final entries of each row; of a pivot row, without the pivot. */
  columns: number[][]
  values: number[][]
  /** In order: row `target` had `factor` x row `source` taken off. */
  target: number[]
  source: number[]
  factor: number[]
  /** Rows that depend on the pivot rows. */
  dependent: number[]
}

/**
 * Eliminates a sparse core by Markowitz's choice (Management Science 3, 1957): few entries first, with threshold
 * pivoting. Every entry carries the size of the terms it was made of, and its rank is judged against that, so the
 * verdict does not depend on units or on the sizes of flows. `knownSize` is the size of each row's known terms: a row in
 * which they outweigh its unknowns gives these as a small difference and comes last. The arrays are taken over and changed.
 */
export function eliminateCore(
  columns: number[][],
  values: number[][],
  nColumns: number,
  knownSize: number[],
): CoreFactors {
  const nRows = columns.length
  const sizes = values.map((row) => row.map(Math.abs))
  const rowsOf: number[][] = Array.from({ length: nColumns }, () => [])
  const columnCount = new Int32Array(nColumns)
  for (let i = 0; i < nRows; i++)
    for (const j of columns[i] as number[]) {
      rowsOf[j]?.push(i)
      columnCount[j]!++
    }
  const place = new Int32Array(nColumns).fill(-1)
  const done = new Uint8Array(nRows)
  const deferred = new Uint8Array(nRows)
  const buckets: number[][] = []
  const enqueue = (i: number): void => {
    const count = (columns[i] as number[]).length
    if (!buckets[count]) buckets[count] = []
    buckets[count]?.push(i)
  }
  const factors: CoreFactors = {
    pivotRow: [],
    pivotColumn: [],
    pivotValue: [],
    columns,
    values,
    target: [],
    source: [],
    factor: [],
    dependent: [],
  }
  for (let i = 0; i < nRows; i++) enqueue(i)

  /** Best entry of a row: the sparsest column among entries that are large and sound; -1 where all are doubtful. */
  const bestIn = (i: number): number => {
    const its = columns[i] as number[]
    const v = values[i] as number[]
    const s = sizes[i] as number[]
    let largest = knownSize[i] as number
    for (let k = 0; k < v.length; k++) largest = Math.max(largest, Math.abs(v[k] as number))
    let best = -1
    for (let k = 0; k < v.length; k++) {
      const size = Math.abs(v[k] as number)
      if (size < THRESHOLD * largest || size < DOUBTFUL * (s[k] as number)) continue
      if (best < 0) best = k
      else {
        const count = columnCount[its[k] as number] as number
        const bestCount = columnCount[its[best] as number] as number
        if (count < bestCount || (count === bestCount && size > Math.abs(v[best] as number))) best = k
      }
    }
    return best
  }

  const pivotOn = (i: number, k: number): void => {
    const its = columns[i] as number[]
    const v = values[i] as number[]
    const s = sizes[i] as number[]
    const j = its[k] as number
    const pivot = v[k] as number
    const pivotSize = s[k] as number
    done[i] = 1
    const last = its.length - 1
    its[k] = its[last] as number
    v[k] = v[last] as number
    s[k] = s[last] as number
    its.pop()
    v.pop()
    s.pop()
    for (const column of its) columnCount[column]!--
    factors.pivotRow.push(i)
    factors.pivotColumn.push(j)
    factors.pivotValue.push(pivot)
    for (const target of rowsOf[j] as number[]) if (!done[target]) subtract(target, i, j, pivot, pivotSize)
    rowsOf[j] = []
  }

  /** Takes row `from` off row `target` so that column `j` leaves it. */
  const subtract = (target: number, from: number, j: number, pivot: number, pivotSize: number): void => {
    const its = columns[target] as number[]
    const v = values[target] as number[]
    const s = sizes[target] as number[]
    const at = its.indexOf(j)
    if (at < 0) return
    const factor = (v[at] as number) / pivot
    // What the factor is unsure of, in the same measure: its own terms and those of the pivot.
    const factorSize = Math.max(s[at] as number, Math.abs(factor) * pivotSize) / Math.abs(pivot)
    for (let k = 0; k < its.length; k++) place[its[k] as number] = k
    knownSize[target] = Math.max(knownSize[target] as number, Math.abs(factor) * (knownSize[from] as number))
    const fromColumns = columns[from] as number[]
    const fromValues = values[from] as number[]
    const fromSizes = sizes[from] as number[]
    for (let k = 0; k < fromColumns.length; k++) {
      const column = fromColumns[k] as number
      const change = factor * (fromValues[k] as number)
      const size = Math.max(Math.abs(factor) * (fromSizes[k] as number), factorSize * Math.abs(fromValues[k] as number))
      const here = place[column] as number
      if (here >= 0) {
        v[here]! -= change
        s[here] = Math.max(s[here] as number, size)
      } else {
        its.push(column)
        v.push(-change)
        s.push(size)
        rowsOf[column]?.push(target)
        columnCount[column]!++
      }
    }
    let kept = 0
    for (let k = 0; k < its.length; k++) {
      const column = its[k] as number
      place[column] = -1
      const drop = k === at || Math.abs(v[k] as number) <= DROP * (s[k] as number)
      if (drop) {
        if (k !== at) columnCount[column]!--
        continue
      }
      its[kept] = column
      v[kept] = v[k] as number
      s[kept] = s[k] as number
      kept++
    }
    its.length = kept
    v.length = kept
    s.length = kept
    factors.target.push(target)
    factors.source.push(from)
    factors.factor.push(factor)
    if (!deferred[target]) enqueue(target)
  }

  /** The next pivot by least product of counts among a few of the shortest rows. */
  const choose = (): [number, number] | undefined => {
    let best: [number, number] | undefined
    let bestCost = Number.POSITIVE_INFINITY
    let looked = 0
    for (let count = 1; count < buckets.length; count++) {
      const bucket = buckets[count]
      if (!bucket) continue
      if (bestCost <= (count - 1) * (count - 1)) break
      for (let q = bucket.length - 1; q >= 0; q--) {
        const i = bucket[q] as number
        if (done[i] || deferred[i] || (columns[i] as number[]).length !== count) {
          bucket[q] = bucket[bucket.length - 1] as number
          bucket.pop()
          continue
        }
        const k = bestIn(i)
        if (k < 0) {
          deferred[i] = 1
          bucket[q] = bucket[bucket.length - 1] as number
          bucket.pop()
          continue
        }
        const cost = (count - 1) * ((columnCount[(columns[i] as number[])[k] as number] as number) - 1)
        if (cost < bestCost) {
          best = [i, k]
          bestCost = cost
        }
        if (++looked >= CANDIDATES) return best
      }
    }
    return best
  }
  for (let pivot = choose(); pivot; pivot = choose()) pivotOn(...pivot)
  pivotDeferred()
  for (let i = 0; i < nRows; i++) if (!done[i]) factors.dependent.push(i)
  return factors

  /** Rows of doubtful entries only: the soundest first, until what is left counts as nothing. */
  function pivotDeferred(): void {
    for (;;) {
      let best: [number, number] | undefined
      let soundest = 0
      for (let i = 0; i < nRows; i++) {
        if (done[i] || !deferred[i]) continue
        const v = values[i] as number[]
        for (let k = 0; k < v.length; k++) {
          const size = Math.abs(v[k] as number)
          if (size <= RANK_TOLERANCE * ((sizes[i] as number[])[k] as number)) continue
          const soundness = size / Math.max((sizes[i] as number[])[k] as number, knownSize[i] as number)
          if (soundness > soundest) {
            soundest = soundness
            best = [i, k]
          }
        }
      }
      if (!best) return
      if (!best) return
      pivotOn(...best)
    }
  }
}
