import { numberFormat } from './number-format'
import { rowKey, taggedName } from './table-model'
import { fillRow, nextRow, putLive, putText } from './xlsx-cells'
import { at, type ClosureSheet, type ColumnName, columns, putBand, putPercent } from './xlsx-closure-sheet'
import { type Ref, sumOf, unknownIn, unknownText } from './xlsx-formulas'
import * as style from './xlsx-styles'

/** Of each stream: its total against the sum of its component flows, and the sum of its fractions. */
export function putStreamChecks({ sheet, table, closure, places, differenceFormat }: ClosureSheet): void {
  const last = table.components.length - 1
  if (last < 0) return
  putBand(sheet, 'Streams', {
    in: 'total',
    out: 'sum of parts',
    difference: 'difference',
    percent: '% of total',
    finding: 'sum of fractions, %',
  })
  table.streams.forEach((stream, s) => {
    const present = closure.present[s] as number[]
    const row = nextRow(sheet)
    putText(row.getCell(columns.place), taggedName(stream), style.rowLabel)
    fillRow(row, columns.component, columns.finding, style.rowLabel)
    if (present.length === 0) return
    putText(row.getCell(columns.unit), table.flowUnit, style.rowUnit)
    const ref = (measure: 'flow' | 'componentFlow' | 'fraction', c: number | null): Ref => ({
      at: places.ref(rowKey(measure, c), s),
      value: places.cell(rowKey(measure, c), s).value,
    })
    const total = ref('flow', null)
    const flows = present.map((c) => ref('componentFlow', c))
    const shares = present.map((c) => ref('fraction', c))
    // Absent components hold a dash, which neither counts nor adds.
    const flowSpan = places.span(rowKey('componentFlow', 0), rowKey('componentFlow', last), s)
    const shareSpan = places.span(rowKey('fraction', 0), rowKey('fraction', last), s)
    const n = present.length
    const put = (name: ColumnName, formula: string, result: number | string, format: string): void =>
      putLive(row.getCell(columns[name]), { formula, result }, format, style.figure)
    const flowSum = sumOf(flows)
    const shareSum = sumOf(shares)
    const unknown = unknownIn([total, ...flows])
    const [i, o, u] = [at('in', row.number), at('out', row.number), at('unknown', row.number)]
    const size = numberFormat(total.value ?? 0, 6)
    put('in', `IF(ISNUMBER(${total.at}),${total.at},"${unknownText}")`, total.value ?? unknownText, size)
    put('out', `IF(COUNT(${flowSpan})=${n},SUM(${flowSpan}),"${unknownText}")`, flowSum ?? unknownText, size)
    put('unknown', `${n + 1}-COUNT(${total.at},${flowSpan})`, unknown, '0')
    const difference = total.value === null || flowSum === null ? null : total.value - flowSum
    const open = `not closed: ${unknown} unknown`
    const formula = `IF(COUNT(${i},${o})=2,${i}-${o},"not closed: "&${u}&" unknown")`
    put('difference', formula, difference ?? open, differenceFormat)
    putPercent(row, difference, total.value)
    const notSummed = `IF(COUNT(${shareSpan})=${n},SUM(${shareSpan}),"not summed: "&(${n}-COUNT(${shareSpan}))&" unknown")`
    put('finding', notSummed, shareSum ?? `not summed: ${unknownIn(shares)} unknown`, '0.0000')
  })
}
