/** A binary heap of row numbers by ascending key; equal keys leave by row number, so the order is reproducible. */
export class RowHeap {
  private readonly rows: Int32Array
  private readonly keys: Float64Array
  private size = 0

  /** Each row may be pushed at most once in the heap's life. */
  constructor(capacity: number) {
    this.rows = new Int32Array(capacity + 1)
    this.keys = new Float64Array(capacity + 1)
  }

  push(row: number, key: number): void {
    let at = this.size++
    while (at > 0) {
      const parent = (at - 1) >> 1
      if (!this.isBefore(key, row, parent)) break
      this.rows[at] = this.rows[parent] as number
      this.keys[at] = this.keys[parent] as number
      at = parent
    }
    this.rows[at] = row
    this.keys[at] = key
  }

  /** The row of least key, or -1. */
  pop(): number {
    if (this.size === 0) return -1
    const top = this.rows[0] as number
    const row = this.rows[--this.size] as number
    const key = this.keys[this.size] as number
    let at = 0
    for (;;) {
      let child = 2 * at + 1
      if (child >= this.size) break
      if (child + 1 < this.size && this.isBefore(this.keys[child + 1] as number, this.rows[child + 1] as number, child))
        child++
      if (this.isBefore(key, row, child)) break
      this.rows[at] = this.rows[child] as number
      this.keys[at] = this.keys[child] as number
      at = child
    }
    this.rows[at] = row
    this.keys[at] = key
    return top
  }

  private isBefore(key: number, row: number, at: number): boolean {
    const other = this.keys[at] as number
    return key < other || (key === other && row < (this.rows[at] as number))
  }
}
