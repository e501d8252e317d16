import type { Row, Worksheet } from 'exceljs'
import type { ClosureModel } from './closure'
import { numberFormat } from './number-format'
import type { StreamTable } from './table-model'
import { address, fillRow, nextRow, putLive, putNumber, putText } from './xlsx-cells'
import { type Amount, type Ref, unknownText } from './xlsx-formulas'
import type { Places } from './xlsx-stream-table'
import * as style from './xlsx-styles'

export const closureSheetName = 'Closure'

/** Columns of the sheet, the same for every part of it. */
export const columns = {
  place: 1,
  component: 2,
  unit: 3,
  in: 4,
  out: 5,
  formed: 6,
  gain: 7,
  difference: 8,
  percent: 9,
  unknown: 10,
  finding: 11,
} as const
export type ColumnName = keyof typeof columns

/** Where parts of long sums may stand: right of the table, wide apart. */
export const spare = { in: 13, out: 53, formed: 93 } as const

/** Per cent. Common practice: 0.1 to 1. Written in a cell, so that the reader can set another. */
export const usualClosureLimit = 0.1

/** Part of the largest flow that rounding alone may leave. */
export const rounding = 1e-9

/** Cells of the sheet that every finding leans on. */
export const limitCell = '$D$2'
export const throughputCell = '$D$3'

/** What the parts of the sheet share while it is written from top to bottom. */
export type ClosureSheet = {
  sheet: Worksheet
  table: StreamTable
  closure: ClosureModel
  places: Places
  /** Per cent. */
  limit: number
  /** Largest total flow. */
  throughput: number
  /** One format for every difference: a millionth of the throughput shows, rounding does not. */
  differenceFormat: string
  extents: Ref[]
  formations: Ref[]
  contents: Ref[]
}

export const at = (name: ColumnName, row: number): string => address(columns[name], row)

export function putBand(sheet: Worksheet, text: string, heads: Partial<Record<ColumnName, string>> = {}): void {
  const row = nextRow(sheet, 15)
  fillRow(row, 1, columns.finding, style.band)
  putText(row.getCell(1), text, style.band)
  const right = { ...style.band, alignment: { horizontal: 'right', vertical: 'middle' } } as const
  for (const [name, head] of Object.entries(heads) as [ColumnName, string][])
    putText(row.getCell(columns[name]), head, right)
}

export function putAmount(context: ClosureSheet, row: Row, name: ColumnName, { formula, value }: Amount): void {
  const cell = row.getCell(columns[name])
  const size = value ?? 0
  const isRounding = Math.abs(size) <= rounding * context.throughput
  const format = isRounding ? context.differenceFormat : numberFormat(size, 6)
  if (formula === null) putNumber(cell, value ?? 0, format, style.figure)
  else putLive(cell, { formula, result: value ?? unknownText }, format, style.figure)
}

/** The difference as a part of what enters, or a dash. */
export function putPercent(row: Row, difference: number | null, into: number | null): void {
  const [d, i] = [at('difference', row.number), at('in', row.number)]
  const result = difference === null || into === null || into === 0 ? '–' : (100 * difference) / into
  const formula = `IF(ISNUMBER(${d}),IF(${i}=0,"–",100*${d}/${i}),"–")`
  putLive(row.getCell(columns.percent), { formula, result }, '0.000', style.figure)
}
