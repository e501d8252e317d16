/** Entries below this part of the terms they are made of are rounding. */
const NOTHING = 1e-9

type PivotRow = { pivot: number; columns: number[]; values: number[]; from?: Map<number, number> }

/**
 * The span of a few rows over many columns, for asking whether a linear form follows from them, and by which of them.
 * Rows are taken in the order given and a row that follows from those before it is passed over, so that the order says
 * which equations are preferred. Right sides play no part: values come from the exact answer.
 */
export class Span {
  private readonly work: Float64Array
  private readonly terms: Float64Array
  private readonly pivotOf: Int32Array
  private touched: number[] = []
  private rows: PivotRow[] = []

  /**
   * `size`: how large each column is, so that entries can be compared; `isZero`: 1 for flows that are exactly 0 in the
   * answer; both of length nColumns. `tracked`: keep which rows each combination is made of.
   */
  constructor(
    private readonly size: Float64Array,
    private readonly isZero: Uint8Array,
    private readonly tracked: boolean,
  ) {
    this.work = new Float64Array(size.length)
    this.terms = new Float64Array(size.length)
    this.pivotOf = new Int32Array(size.length).fill(-1)
  }

  clear(): void {
    for (const { pivot } of this.rows) this.pivotOf[pivot] = -1
    this.rows = []
  }

  get rank(): number {
    return this.rows.length
  }

  /** Takes a row in under a number; false where it follows from the rows before it. */
  add(columns: readonly number[], values: readonly number[], id: number): boolean {
    this.load(columns, values)
    const from = this.tracked ? new Map([[id, 1]]) : undefined
    this.reduce(from)
    return this.keep(from)
  }

  /** True where the form is the same in every solution of the rows. */
  covers(columns: readonly number[], values: readonly number[]): boolean {
    this.load(columns, values)
    this.reduce(undefined)
    const left = this.remaining()
    this.release()
    return left.length === 0
  }

  /** The rows (by their numbers, each with its factor) that the form follows from; undefined where it does not. */
  combination(columns: readonly number[], values: readonly number[]): Map<number, number> | undefined {
    this.load(columns, values)
    const from = new Map<number, number>()
    this.reduce(from)
    const left = this.remaining()
    this.release()
    return left.length === 0 ? from : undefined
  }

  /** A sum of flows that are all 0 holds each of them at 0: puts the rule to the rows as they stand now. */
  settleZeros(): void {
    for (let changed = true; changed; ) {
      changed = false
      for (const row of [...this.rows]) {
        if (row.columns.length < 2 || !this.isZero[row.pivot]) continue
        this.load(row.columns, row.values, false)
        const from = this.tracked ? new Map(row.from) : undefined
        this.reduce(from, row.pivot)
        const left = this.remaining()
        const sign = Math.sign(this.work[row.pivot] as number)
        const all = left.every((j) => this.isZero[j] && Math.sign(this.work[j] as number) === sign)
        this.release()
        if (!all || left.length < 2) continue
        for (const j of left) {
          if (j === row.pivot || this.pivotOf[j] !== -1) continue
          this.pivotOf[j] = this.rows.push({ pivot: j, columns: [j], values: [1], ...(from && { from }) }) - 1
          changed = true
        }
      }
    }
  }

  private load(columns: readonly number[], values: readonly number[], scaled = true): void {
    let most = 0
    for (let k = 0; k < columns.length; k++) {
      const j = columns[k] as number
      const value = (values[k] as number) * (scaled ? (this.size[j] as number) : 1)
      if (this.terms[j] === 0) this.touched.push(j)
      this.work[j]! += value
      this.terms[j]! += Math.abs(value)
      most = Math.max(most, Math.abs(value))
    }
    if (!scaled || most === 0) return
    for (const j of this.touched) {
      this.work[j]! /= most
      this.terms[j]! /= most
    }
  }

  private reduce(from: Map<number, number> | undefined, except = -1): void {
    const { work, terms } = this
    // Rows hold no pivot of an earlier one, so one pass in order clears them all.
    let next = this.rows.length
    for (const j of this.touched) {
      const at = this.pivotOf[j] as number
      if (at >= 0 && at < next) next = at
    }
    for (let q = next; q < this.rows.length; q++) {
      const row = this.rows[q] as PivotRow
      const { pivot } = row
      const value = work[pivot] as number
      if (value === 0 || pivot === except) continue
      if (Math.abs(value) <= NOTHING * (terms[pivot] as number)) {
        work[pivot] = 0
        continue
      }
      for (let k = 0; k < row.columns.length; k++) {
        const j = row.columns[k] as number
        const part = value * (row.values[k] as number)
        if (terms[j] === 0) this.touched.push(j)
        work[j]! -= part
        terms[j]! += Math.abs(part)
      }
      work[pivot] = 0
      if (from && row.from) for (const [id, factor] of row.from) from.set(id, (from.get(id) ?? 0) - value * factor)
    }
  }

  private remaining(): number[] {
    return this.touched.filter((j) => Math.abs(this.work[j] as number) > NOTHING * (this.terms[j] as number))
  }

  private keep(from: Map<number, number> | undefined): boolean {
    const left = this.remaining()
    const values = left.map((j) => this.work[j] as number)
    this.release()
    if (left.length === 0) return false
    if (
      left.length > 1 &&
      left.every((j, k) => this.isZero[j] && Math.sign(values[k] as number) === Math.sign(values[0] as number))
    ) {
      for (const j of left)
        this.pivotOf[j] =
          this.rows.push({ pivot: j, columns: [j], values: [1], ...(from && { from: new Map(from) }) }) - 1
      return true
    }
    let best = 0
    for (let k = 1; k < left.length; k++) if (Math.abs(values[k] as number) > Math.abs(values[best] as number)) best = k
    const pivot = left[best] as number
    const head = values[best] as number
    if (from) for (const [id, factor] of from) from.set(id, factor / head)
    this.pivotOf[pivot] =
      this.rows.push({ pivot, columns: left, values: values.map((value) => value / head), ...(from && { from }) }) - 1
    return true
  }

  private release(): void {
    for (const j of this.touched) {
      this.work[j] = 0
      this.terms[j] = 0
    }
    this.touched = []
  }
}
