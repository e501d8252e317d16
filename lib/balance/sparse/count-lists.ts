/** Rows in lists by their number of entries, newest first; a row is in one list or in none. No memory is taken after the start. */
export class CountLists {
  /** First row of each count, -1 where there is none; length most + 1. */
  readonly first: Int32Array
  /** The row after each one in its list, or -1. */
  readonly next: Int32Array
  private readonly before: Int32Array
  private readonly countOf: Int32Array

  constructor(nRows: number, most: number) {
    this.first = new Int32Array(most + 1).fill(-1)
    this.next = new Int32Array(nRows).fill(-1)
    this.before = new Int32Array(nRows).fill(-1)
    this.countOf = new Int32Array(nRows).fill(-1)
  }

  /** Puts a row first in the list of its count, taking it out of the one it was in. */
  put(row: number, count: number): void {
    this.remove(row)
    const head = this.first[count] as number
    this.next[row] = head
    this.before[row] = -1
    if (head >= 0) this.before[head] = row
    this.first[count] = row
    this.countOf[row] = count
  }

  remove(row: number): void {
    const count = this.countOf[row] as number
    if (count < 0) return
    const next = this.next[row] as number
    const before = this.before[row] as number
    if (before >= 0) this.next[before] = next
    else this.first[count] = next
    if (next >= 0) this.before[next] = before
    this.countOf[row] = -1
  }
}
