import { otherSum } from '../measure/measure'
import type { Model } from '../model'
import type { RowStore } from './row-store'

/** Totals as sums: one row for each total that has a column of its own, on the book's basis and the other. */
export function pushDefinitions(model: Model, rows: RowStore): void {
  for (let s = 0; s < model.nStreams; s++) {
    const list = model.present[s] as number[]
    if (list.length < 2) continue
    const source = rows.from({ type: 'definition', stream: s })
    const columns = list.map((c) => model.flowColumn[s * model.nComponents + c] as number)
    rows.push(source, [...columns, model.totalColumn[s] as number], [...columns.map(() => 1), -1], 0)
    const other = model.otherTotalColumn[s] as number
    if (other < 0) continue
    const sum = otherSum(model, s)
    rows.push(source, [...sum.columns, other], [...sum.coefficients, -1], 0)
  }
}
