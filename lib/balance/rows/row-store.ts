import { combine, type Measure } from '../measure/measure'

/** Where a row comes from. Balances, definitions and compositions of splitters are structure: never at odds themselves. */
export type Source =
  | { type: 'given'; index: number }
  | { type: 'rule'; index: number }
  | { type: 'balance'; unit: number; component?: number; element?: string }
  | { type: 'definition'; stream: number }
  | { type: 'composition'; unit: string }
  | { type: 'zero' }
  | { type: 'basis' }

/** What was typed for a row that holds one measure at `value`, which differs where rounding was settled; kept for half-widths and for what the others imply. */
export type Typed = { measure: Measure; typed: number; value: number; halfWidth: number }

/**
 * Rows `sum of value x column = rhs`, appended one after another and kept flat. `start[i]` to `start[i + 1]` are the
 * entries of row i; an entry of exactly 0 is never stored.
 */
export class RowStore {
  readonly start: number[] = [0]
  readonly column: number[] = []
  readonly value: number[] = []
  readonly rhs: number[] = []
  readonly source: number[] = []
  readonly typed: (Typed | undefined)[] = []
  readonly sources: Source[] = []

  get count(): number {
    return this.rhs.length
  }

  /** Registers a source and gives its number, to be named by the rows that follow from it. */
  from(source: Source): number {
    return this.sources.push(source) - 1
  }

  push(source: number, columns: readonly number[], values: readonly number[], rhs: number, typed?: Typed): number {
    for (let k = 0; k < columns.length; k++)
      if (values[k] !== 0) {
        this.column.push(columns[k] as number)
        this.value.push(values[k] as number)
      }
    this.start.push(this.column.length)
    this.rhs.push(rhs)
    this.source.push(source)
    this.typed.push(typed)
    return this.rhs.length - 1
  }

  /** One measure held at one value: numerator - value x denominator = 0, or numerator = value. */
  pushMeasure(source: number, measure: Measure, value: number, halfWidth: number, typedValue = value): number {
    const { numerator, denominator } = measure
    const typed: Typed = { measure, typed: typedValue, value, halfWidth }
    if (!denominator)
      return this.push(source, numerator.columns, numerator.coefficients, value - numerator.constant, typed)
    const row = combine(1, numerator, -value, denominator)
    return this.push(source, row.columns, row.coefficients, 0 - row.constant, typed)
  }
}
