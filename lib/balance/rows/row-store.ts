import { combine, type LinearForm, type Measure } from '../measure/measure'

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
  start: number[] = [0]
  column: number[] = []
  value: number[] = []
  rhs: number[] = []
  source: number[] = []
  typed: (Typed | undefined)[] = []
  sources: Source[] = []

  get count(): number {
    return this.rhs.length
  }

  /** A store with the same rows that can be added to by itself. Sources and typed values are shared: they never change. */
  copy(): RowStore {
    const copy = new RowStore()
    copy.start = this.start.slice()
    copy.column = this.column.slice()
    copy.value = this.value.slice()
    copy.rhs = this.rhs.slice()
    copy.source = this.source.slice()
    copy.typed = this.typed.slice()
    copy.sources = this.sources.slice()
    return copy
  }

  /** Registers a source and gives its number, to be named by the rows that follow from it. */
  from(source: Source): number {
    return this.sources.push(source) - 1
  }

  push(source: number, columns: readonly number[], values: readonly number[], rhs: number, typed?: Typed): number {
    for (let k = 0; k < columns.length; k++) this.put(columns[k] as number, values[k] as number)
    return this.close(source, rhs, typed)
  }

  private put(column: number, value: number): void {
    if (value === 0) return
    this.column.push(column)
    this.value.push(value)
  }

  private close(source: number, rhs: number, typed: Typed | undefined): number {
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
    if (isOneColumn(numerator) && isOneColumn(denominator) && numerator.columns[0] !== denominator.columns[0]) {
      this.put(numerator.columns[0] as number, numerator.coefficients[0] as number)
      this.put(denominator.columns[0] as number, -value * (denominator.coefficients[0] as number))
      return this.close(source, 0, typed)
    }
    const row = combine(1, numerator, -value, denominator)
    return this.push(source, row.columns, row.coefficients, 0 - row.constant, typed)
  }
}

const isOneColumn = ({ columns, constant }: LinearForm): boolean => columns.length === 1 && constant === 0
