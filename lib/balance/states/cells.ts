import { cellQuantityOn, quantityOn } from '../measure/cell-quantity'
import type { LinearForm, Measure } from '../measure/measure'
import { columnForm, otherPart, otherTotal, part, share } from '../measure/measure'
import { hasOtherBasis, type Model } from '../model'
import type { Quantity } from '../problem'
import { type CellQuantity, slotOf } from '../solution'

/** A cell of the table: where it stands, what it shows. Cells exist for present components only. */
export type Cell = { slot: number; stream: number; component: number; quantity: CellQuantity; measure: Measure }

/** Every cell that exists, stream by stream. The other basis' cells exist where all molar masses are known. */
export function forEachCell(model: Model, visit: (cell: Cell) => void): void {
  const n = model.nComponents
  for (let stream = 0; stream < model.nStreams; stream++) {
    const list = model.present[stream] as number[]
    const cell = (quantity: CellQuantity, component: number, numerator: LinearForm, denominator?: LinearForm): void =>
      visit({
        slot: slotOf(n, stream, quantity, component),
        stream,
        component,
        quantity,
        measure: denominator ? { numerator, denominator } : { numerator },
      })
    const total = columnForm(model.totalColumn[stream] as number)
    cell('flow', -1, total)
    for (const c of list) {
      cell('componentFlow', c, part(model, stream, c))
      cell('fraction', c, share(model, stream, c).numerator, total)
    }
    if (!hasOtherBasis(model, stream)) continue
    const other = otherTotal(model, stream)
    cell('otherFlow', -1, other)
    for (const c of list) {
      cell('otherComponentFlow', c, otherPart(model, stream, c))
      cell('otherFraction', c, otherPart(model, stream, c), other)
    }
  }
}

/** The cell that a given's quantity names on this basis, undefined for a quantity without one. */
export const cellQuantityOf = (model: Pick<Model, 'problem'>, quantity: Quantity): CellQuantity | undefined =>
  cellQuantityOn(model.problem.basis, quantity)

/** The quantity's name in results for a cell on this basis. */
export const quantityOfCell = (model: Pick<Model, 'problem'>, quantity: CellQuantity): Quantity =>
  quantityOn(model.problem.basis, quantity)
