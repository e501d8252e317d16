import { cellQuantityOn, quantityOn } from '../measure/cell-quantity'
import { columnForm, type LinearForm, type Measure, otherTotal } from '../measure/measure'
import { hasOtherBasis, type Model, otherPerOwn } from '../model'
import type { Quantity } from '../problem'
import { type CellQuantity, slotOf } from '../solution'

/**
 * A cell of the table: where it stands, what it shows. Cells exist for present components only. One object goes from
 * cell to cell, so that a walk over 150,000 of them leaves nothing to collect: take out of it what is to be kept.
 */
export class Cell {
  slot = 0
  stream = 0
  /** -1 for a total. */
  component = -1
  quantity: CellQuantity = 'flow'
  /** The numerator is this column times this coefficient; -1 for an other total without a column of its own. */
  column = -1
  coefficient = 1

  constructor(private readonly model: Model) {}

  /** True for the two fractions: their denominators are the totals of the stream, `flow` and `otherFlow`. */
  get isFraction(): boolean {
    return this.quantity === 'fraction' || this.quantity === 'otherFraction'
  }

  get measure(): Measure {
    const numerator = this.quantity === 'otherFlow' ? this.otherTotal : columnForm(this.column, this.coefficient)
    if (!this.isFraction) return { numerator }
    return { numerator, denominator: this.quantity === 'fraction' ? this.total : this.otherTotal }
  }

  private get total(): LinearForm {
    return columnForm(this.model.totalColumn[this.stream] as number)
  }

  private get otherTotal(): LinearForm {
    return otherTotal(this.model, this.stream)
  }
}

/** A cell taken out of a walk, to be kept. */
export type KeptCell = Pick<Cell, 'slot' | 'stream' | 'component' | 'quantity' | 'measure'>

export const keepCell = ({ slot, stream, component, quantity, measure }: Cell): KeptCell => ({
  slot,
  stream,
  component,
  quantity,
  measure,
})

/**
 * Every cell that exists, stream by stream, the flow before the fractions that rest on it. The other basis' cells exist
 * where all molar masses are known.
 */
export function forEachCell(model: Model, visit: (cell: Cell) => void): void {
  const n = model.nComponents
  const cell = new Cell(model)
  const at = (quantity: CellQuantity, component: number, column: number, coefficient: number): void => {
    cell.slot = slotOf(n, cell.stream, quantity, component)
    cell.component = component
    cell.quantity = quantity
    cell.column = column
    cell.coefficient = coefficient
    visit(cell)
  }
  for (let stream = 0; stream < model.nStreams; stream++) {
    const list = model.present[stream] as number[]
    cell.stream = stream
    at('flow', -1, model.totalColumn[stream] as number, 1)
    for (const c of list) {
      const column = model.flowColumn[stream * n + c] as number
      at('componentFlow', c, column, 1)
      at('fraction', c, column, 1)
    }
    if (!hasOtherBasis(model, stream)) continue
    at('otherFlow', -1, model.otherTotalColumn[stream] as number, 1)
    for (const c of list) {
      const column = model.flowColumn[stream * n + c] as number
      const coefficient = otherPerOwn(model, c)
      at('otherComponentFlow', c, column, coefficient)
      at('otherFraction', c, column, coefficient)
    }
  }
}

/** The cell that a given's quantity names on this basis, undefined for a quantity without one. */
export const cellQuantityOf = (model: Pick<Model, 'problem'>, quantity: Quantity): CellQuantity | undefined =>
  cellQuantityOn(model.problem.basis, quantity)

/** The quantity's name in results for a cell on this basis. */
export const quantityOfCell = (model: Pick<Model, 'problem'>, quantity: CellQuantity): Quantity =>
  quantityOn(model.problem.basis, quantity)
