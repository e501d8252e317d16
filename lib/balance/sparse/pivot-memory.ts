import type { CoreRows, PivotOrder } from './core'
import type { CoreFactors } from './core-factors'

/** One edit meets a handful of patterns: each round in which rules turn linear, each pass without what is at odds. */
const MOST = 12

type Kept = { nColumns: number; start: Int32Array; column: Int32Array; order: PivotOrder }

/**
 * The order of pivots of the patterns met last, so that the choice need not be made again while only values change. It
 * holds no numbers: every pivot is tested against the new ones when it is used.
 */
export class PivotMemory {
  private readonly kept: Kept[] = []

  /** The order for rows whose entries stand in exactly the same places, if one is remembered. */
  recall(rows: CoreRows): PivotOrder | undefined {
    return this.find(rows)?.order
  }

  remember(rows: CoreRows, { pivotRow, pivotColumn, nSound }: CoreFactors): void {
    const { nRows, nColumns, start, column } = rows
    if (nRows === 0) return
    const order = { row: pivotRow.subarray(0, nSound), column: pivotColumn.subarray(0, nSound) }
    const known = this.find(rows)
    if (known) known.order = order
    else {
      this.kept.unshift({ nColumns, start, column: column.subarray(0, start[nRows]), order })
      if (this.kept.length > MOST) this.kept.pop()
    }
  }

  private find({ nRows, nColumns, start, column }: CoreRows): Kept | undefined {
    const place = this.kept.findIndex(
      (its) =>
        its.nColumns === nColumns &&
        its.start.length === nRows + 1 &&
        sameNumbers(its.start, start, nRows + 1) &&
        sameNumbers(its.column, column, start[nRows] as number),
    )
    if (place < 0) return undefined
    const [found] = this.kept.splice(place, 1) as [Kept]
    this.kept.unshift(found)
    return found
  }
}

function sameNumbers(left: Int32Array, right: Int32Array, length: number): boolean {
  if (left.length < length || right.length < length) return false
  for (let k = 0; k < length; k++) if (left[k] !== right[k]) return false
  return true
}
