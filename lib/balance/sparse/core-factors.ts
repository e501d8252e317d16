import { grownFloats, grownInts } from './growing'

/** The factors of the rows that neither substitution nor single columns settle. Rows and columns are numbered locally. */
export type CoreFactors = {
  /** By pivot, in order. */
  pivotRow: Int32Array
  pivotColumn: Int32Array
  pivotValue: Float64Array
  /** Other entries of the row of pivot q as they stood when it was taken: `start[q]` to `start[q + 1]`. */
  start: Int32Array
  column: Int32Array
  value: Float64Array
  /** In order: row `target` had `factor` x row `source` taken off. */
  target: Int32Array
  source: Int32Array
  factor: Float64Array
  /** Rows that depend on the pivot rows. */
  dependent: number[]
  /** Pivots that were sound when taken; the rest were doubtful and came last. */
  nSound: number
}

/** Takes factors down as they come. */
export class FactorLog {
  private pivots = 0
  private entries = 0
  private steps = 0
  private readonly pivotRow: Int32Array
  private readonly pivotColumn: Int32Array
  private readonly pivotValue: Float64Array
  private readonly start: Int32Array
  private column: Int32Array
  private value: Float64Array
  private target: Int32Array
  private source: Int32Array
  private factor: Float64Array

  constructor(most: number, nEntries: number) {
    this.pivotRow = new Int32Array(most)
    this.pivotColumn = new Int32Array(most)
    this.pivotValue = new Float64Array(most)
    this.start = new Int32Array(most + 1)
    this.column = new Int32Array(nEntries)
    this.value = new Float64Array(nEntries)
    this.target = new Int32Array(nEntries)
    this.source = new Int32Array(nEntries)
    this.factor = new Float64Array(nEntries)
  }

  get nPivots(): number {
    return this.pivots
  }

  /** A pivot; the other entries of its row follow. */
  pivot(row: number, column: number, value: number): void {
    this.pivotRow[this.pivots] = row
    this.pivotColumn[this.pivots] = column
    this.pivotValue[this.pivots++] = value
    this.start[this.pivots] = this.entries
  }

  /** Another entry of the row of the last pivot. */
  entry(column: number, value: number): void {
    if (this.entries === this.column.length) {
      this.column = grownInts(this.column, this.entries + 1)
      this.value = grownFloats(this.value, this.entries + 1)
    }
    this.column[this.entries] = column
    this.value[this.entries++] = value
    this.start[this.pivots] = this.entries
  }

  step(target: number, source: number, factor: number): void {
    if (this.steps === this.target.length) {
      this.target = grownInts(this.target, this.steps + 1)
      this.source = grownInts(this.source, this.steps + 1)
      this.factor = grownFloats(this.factor, this.steps + 1)
    }
    this.target[this.steps] = target
    this.source[this.steps] = source
    this.factor[this.steps++] = factor
  }

  finish(dependent: number[], nSound: number): CoreFactors {
    return {
      pivotRow: this.pivotRow.subarray(0, this.pivots),
      pivotColumn: this.pivotColumn.subarray(0, this.pivots),
      pivotValue: this.pivotValue.subarray(0, this.pivots),
      start: this.start.subarray(0, this.pivots + 1),
      column: this.column.subarray(0, this.entries),
      value: this.value.subarray(0, this.entries),
      target: this.target.subarray(0, this.steps),
      source: this.source.subarray(0, this.steps),
      factor: this.factor.subarray(0, this.steps),
      dependent,
      nSound,
    }
  }
}
