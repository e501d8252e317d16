import type { CoreRows } from './core'
import { grownFloats, grownInts } from './growing'

/**
 * Entries of sparse rows that change, each in the list of its row and in the list of its column, so that taking one row
 * off another touches only the entries that change: a total over fifty components costs no more than a short row.
 * Entries are numbered; the lists are doubly linked through flat arrays (-1 ends them), and nothing is left to the
 * garbage collector. `size` is that of the terms an entry was made of.
 */
export class EntryTable {
  row: Int32Array
  column: Int32Array
  value: Float64Array
  size: Float64Array
  nextInRow: Int32Array
  nextInColumn: Int32Array
  private beforeInRow: Int32Array
  private beforeInColumn: Int32Array
  readonly firstInRow: Int32Array
  readonly firstInColumn: Int32Array
  readonly rowCount: Int32Array
  readonly columnCount: Int32Array
  private end = 0
  private spare = -1

  constructor({ nRows, nColumns, start, column, value }: CoreRows) {
    const capacity = (start[nRows] as number) + 16
    this.row = new Int32Array(capacity)
    this.column = new Int32Array(capacity)
    this.value = new Float64Array(capacity)
    this.size = new Float64Array(capacity)
    this.nextInRow = new Int32Array(capacity)
    this.nextInColumn = new Int32Array(capacity)
    this.beforeInRow = new Int32Array(capacity)
    this.beforeInColumn = new Int32Array(capacity)
    this.firstInRow = new Int32Array(nRows).fill(-1)
    this.firstInColumn = new Int32Array(nColumns).fill(-1)
    this.rowCount = new Int32Array(nRows)
    this.columnCount = new Int32Array(nColumns)
    // New entries come first in their lists: from the end, so that the lists read forwards.
    for (let i = nRows - 1; i >= 0; i--)
      for (let k = (start[i + 1] as number) - 1; k >= (start[i] as number); k--)
        this.add(i, column[k] as number, value[k] as number, Math.abs(value[k] as number))
  }

  add(row: number, column: number, value: number, size: number): void {
    let entry = this.spare
    if (entry >= 0) this.spare = this.nextInRow[entry] as number
    else {
      entry = this.end++
      if (entry === this.row.length) this.grow()
    }
    this.row[entry] = row
    this.column[entry] = column
    this.value[entry] = value
    this.size[entry] = size
    const inRow = this.firstInRow[row] as number
    this.nextInRow[entry] = inRow
    this.beforeInRow[entry] = -1
    if (inRow >= 0) this.beforeInRow[inRow] = entry
    this.firstInRow[row] = entry
    const inColumn = this.firstInColumn[column] as number
    this.nextInColumn[entry] = inColumn
    this.beforeInColumn[entry] = -1
    if (inColumn >= 0) this.beforeInColumn[inColumn] = entry
    this.firstInColumn[column] = entry
    this.rowCount[row]!++
    this.columnCount[column]!++
  }

  /** Takes an entry out. Its number may be given to the next one that is added. */
  remove(entry: number): void {
    const row = this.row[entry] as number
    const column = this.column[entry] as number
    const inRow = this.nextInRow[entry] as number
    const aheadInRow = this.beforeInRow[entry] as number
    if (aheadInRow >= 0) this.nextInRow[aheadInRow] = inRow
    else this.firstInRow[row] = inRow
    if (inRow >= 0) this.beforeInRow[inRow] = aheadInRow
    const inColumn = this.nextInColumn[entry] as number
    const aheadInColumn = this.beforeInColumn[entry] as number
    if (aheadInColumn >= 0) this.nextInColumn[aheadInColumn] = inColumn
    else this.firstInColumn[column] = inColumn
    if (inColumn >= 0) this.beforeInColumn[inColumn] = aheadInColumn
    this.rowCount[row]!--
    this.columnCount[column]!--
    this.nextInRow[entry] = this.spare
    this.spare = entry
  }

  /** The entry of a row in a column, or -1. Goes through the row. */
  find(row: number, column: number): number {
    let entry = this.firstInRow[row] as number
    while (entry >= 0 && this.column[entry] !== column) entry = this.nextInRow[entry] as number
    return entry
  }

  private grow(): void {
    const more = this.end + 1
    this.row = grownInts(this.row, more)
    this.column = grownInts(this.column, more)
    this.value = grownFloats(this.value, more)
    this.size = grownFloats(this.size, more)
    this.nextInRow = grownInts(this.nextInRow, more)
    this.nextInColumn = grownInts(this.nextInColumn, more)
    this.beforeInRow = grownInts(this.beforeInRow, more)
    this.beforeInColumn = grownInts(this.beforeInColumn, more)
  }
}
