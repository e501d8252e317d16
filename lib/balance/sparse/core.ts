import { type CoreFactors, FactorLog } from './core-factors'
import { CountLists } from './count-lists'
import { EntryTable } from './entry-table'

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

/** The core's rows in compressed form, numbered locally; `knownSize` is the size of each row's known terms. */
export type CoreRows = {
  nRows: number
  nColumns: number
  start: Int32Array
  column: Int32Array
  value: Float64Array
  knownSize: Float64Array
}

/** An order of pivots found before, to be tried first. */
export type PivotOrder = { row: Int32Array; column: Int32Array }

/**
 * Eliminates a sparse core by Markowitz's choice (Management Science 3, 1957): few entries first, with threshold
 * pivoting. Every entry carries the size of the terms it was made of, and its rank is judged against that, so the
 * verdict does not depend on units or on the sizes of flows. A row whose known terms outweigh its unknowns gives these
 * as a small difference and comes last. Pivots of `order` are taken as long as each passes the same tests as a pivot
 * chosen anew; from the first that does not, the choice is free again, so an old order can cost time but not soundness.
 */
export function eliminateCore(rows: CoreRows, order?: PivotOrder): CoreFactors {
  return new Core(rows).eliminate(order)
}

class Core {
  private readonly nRows: number
  private readonly entries: EntryTable
  private readonly knownSize: Float64Array
  private readonly done: Uint8Array
  private readonly deferred: Uint8Array
  private readonly log: FactorLog
  /** Rows that the pivot is taken off, with their factors and what these are unsure of. */
  private nTargets = 0
  private readonly target: Int32Array
  private readonly factor: Float64Array
  private readonly factorSize: Float64Array
  /** Entry of each row in the column at work; of the row whose mark is the present one. */
  private readonly entryOf: Int32Array
  private readonly markOf: Int32Array
  private mark = 0
  /** Undefined while a known order is followed. */
  private lists: CountLists | undefined

  constructor(rows: CoreRows) {
    const { nRows, nColumns, start, knownSize } = rows
    this.nRows = nRows
    this.entries = new EntryTable(rows)
    this.knownSize = knownSize.slice()
    this.done = new Uint8Array(nRows)
    this.deferred = new Uint8Array(nRows)
    this.log = new FactorLog(Math.min(nRows, nColumns), start[nRows] as number)
    this.target = new Int32Array(nRows)
    this.factor = new Float64Array(nRows)
    this.factorSize = new Float64Array(nRows)
    this.entryOf = new Int32Array(nRows)
    this.markOf = new Int32Array(nRows)
  }

  eliminate(order: PivotOrder | undefined): CoreFactors {
    if (order) this.follow(order)
    this.lists = new CountLists(this.nRows, this.entries.columnCount.length)
    for (let i = this.nRows - 1; i >= 0; i--) if (!this.done[i]) this.lists.put(i, this.entries.rowCount[i] as number)
    for (let pivot = this.choose(); pivot >= 0; pivot = this.choose()) this.pivotOn(pivot)
    const nSound = this.log.nPivots
    this.pivotDeferred()
    const dependent: number[] = []
    for (let i = 0; i < this.nRows; i++) if (!this.done[i]) dependent.push(i)
    return this.log.finish(dependent, nSound)
  }

  /** Takes pivots of a known order until one is no longer as sound as a chosen one would be. */
  private follow({ row, column }: PivotOrder): void {
    for (let q = 0; q < row.length; q++) {
      const i = row[q] as number
      const entry = this.entries.find(i, column[q] as number)
      if (entry < 0 || !this.isSound(entry, this.largestIn(i))) return
      this.pivotOn(entry)
    }
  }

  private largestIn(row: number): number {
    const { firstInRow, nextInRow, value } = this.entries
    let largest = this.knownSize[row] as number
    for (let k = firstInRow[row] as number; k >= 0; k = nextInRow[k] as number)
      largest = Math.max(largest, Math.abs(value[k] as number))
    return largest
  }

  private isSound(entry: number, largest: number): boolean {
    const size = Math.abs(this.entries.value[entry] as number)
    return size >= THRESHOLD * largest && size >= DOUBTFUL * (this.entries.size[entry] as number)
  }

  /** Best entry of a row: the sparsest column among entries that are large and sound; -1 where all are doubtful. */
  private bestIn(row: number): number {
    const { firstInRow, nextInRow, column, columnCount, value } = this.entries
    const largest = this.largestIn(row)
    let best = -1
    let bestCount = 0
    for (let k = firstInRow[row] as number; k >= 0; k = nextInRow[k] as number) {
      if (!this.isSound(k, largest)) continue
      const count = columnCount[column[k] as number] as number
      const isBetter =
        count < bestCount || (count === bestCount && Math.abs(value[k] as number) > Math.abs(value[best] as number))
      if (best >= 0 && !isBetter) continue
      best = k
      bestCount = count
    }
    return best
  }

  /** The next pivot by least product of counts among a few of the shortest rows; -1 where none is left. */
  private choose(): number {
    const lists = this.lists as CountLists
    const { column, columnCount } = this.entries
    let chosen = -1
    let bestCost = Number.POSITIVE_INFINITY
    let looked = 0
    for (let count = 1; count < lists.first.length; count++) {
      if (bestCost <= (count - 1) * (count - 1)) break
      let after = -1
      for (let i = lists.first[count] as number; i >= 0; i = after) {
        after = lists.next[i] as number
        const best = this.bestIn(i)
        if (best < 0) {
          this.deferred[i] = 1
          lists.remove(i)
          continue
        }
        const cost = (count - 1) * ((columnCount[column[best] as number] as number) - 1)
        if (cost < bestCost) {
          chosen = best
          bestCost = cost
        }
        if (cost === 0 || ++looked >= CANDIDATES) return chosen
      }
    }
    return chosen
  }

  /** Takes an entry as pivot: its row comes off every other row of its column, and both are done with. */
  private pivotOn(pivot: number): void {
    const { entries, lists, deferred, target } = this
    const i = entries.row[pivot] as number
    const j = entries.column[pivot] as number
    this.done[i] = 1
    lists?.remove(i)
    this.log.pivot(i, j, entries.value[pivot] as number)
    this.takeFactors(pivot, i, j)
    for (let k = entries.firstInRow[i] as number; k >= 0; k = entries.firstInRow[i] as number) {
      const c = entries.column[k] as number
      const value = entries.value[k] as number
      const size = entries.size[k] as number
      this.log.entry(c, value)
      entries.remove(k)
      this.changeColumn(c, value, size)
    }
    if (!lists) return
    for (let t = 0; t < this.nTargets; t++) {
      const row = target[t] as number
      if (!deferred[row]) lists.put(row, entries.rowCount[row] as number)
    }
  }

  /** Empties the pivot's column, noting for each row there how much of the pivot's row has to come off it. */
  private takeFactors(pivot: number, i: number, j: number): void {
    const { entries, knownSize, target, factor, factorSize, log } = this
    const { firstInColumn, row, value, size } = entries
    const pivotValue = value[pivot] as number
    const pivotSize = size[pivot] as number
    entries.remove(pivot)
    let n = 0
    for (let k = firstInColumn[j] as number; k >= 0; k = firstInColumn[j] as number) {
      const its = row[k] as number
      const f = (value[k] as number) / pivotValue
      const share = Math.abs(f)
      target[n] = its
      factor[n] = f
      // What the factor is unsure of, in the same measure: its own terms and those of the pivot.
      factorSize[n++] = Math.max(size[k] as number, share * pivotSize) / Math.abs(pivotValue)
      knownSize[its] = Math.max(knownSize[its] as number, share * (knownSize[i] as number))
      log.step(its, i, f)
      entries.remove(k)
    }
    this.nTargets = n
  }

  /** Takes the pivot row's entry in one column, `value` with its size, off all targets. */
  private changeColumn(column: number, value: number, size: number): void {
    const { entries, target, factor, factorSize, entryOf, markOf } = this
    if (this.nTargets === 0) return
    const mark = ++this.mark
    const { firstInColumn, nextInColumn, row } = entries
    for (let k = firstInColumn[column] as number; k >= 0; k = nextInColumn[k] as number) {
      entryOf[row[k] as number] = k
      markOf[row[k] as number] = mark
    }
    for (let t = 0; t < this.nTargets; t++) {
      const its = target[t] as number
      const change = (factor[t] as number) * value
      const made = Math.max(Math.abs(factor[t] as number) * size, (factorSize[t] as number) * Math.abs(value))
      if (markOf[its] !== mark) {
        if (Math.abs(change) > DROP * made) entries.add(its, column, -change, made)
        continue
      }
      const k = entryOf[its] as number
      const left = (entries.value[k] as number) - change
      const terms = Math.max(entries.size[k] as number, made)
      if (Math.abs(left) <= DROP * terms) entries.remove(k)
      else {
        entries.value[k] = left
        entries.size[k] = terms
      }
    }
  }

  /** Rows of doubtful entries only: the soundest first, until what is left counts as nothing. */
  private pivotDeferred(): void {
    const waiting: number[] = []
    for (let i = 0; i < this.nRows; i++) if (!this.done[i] && this.deferred[i]) waiting.push(i)
    for (;;) {
      const { firstInRow, nextInRow, value, size } = this.entries
      let best = -1
      let soundest = 0
      for (const i of waiting) {
        if (this.done[i]) continue
        for (let k = firstInRow[i] as number; k >= 0; k = nextInRow[k] as number) {
          const own = Math.abs(value[k] as number)
          if (own <= RANK_TOLERANCE * (size[k] as number)) continue
          const soundness = own / Math.max(size[k] as number, this.knownSize[i] as number)
          if (soundness <= soundest) continue
          soundest = soundness
          best = k
        }
      }
      if (best < 0) return
      this.pivotOn(best)
    }
  }
}
