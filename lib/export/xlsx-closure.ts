import type { Workbook } from 'exceljs'
import type { ClosureModel } from './closure'
import { decimalsFor, fixedFormat, numberFormat } from './number-format'
import { rowKey, type StreamTable } from './table-model'
import type { TitleBlock } from './title-block'
import { lastRowOf, nextRow, putLive, putNumber, putText } from './xlsx-cells'
import { putGroup } from './xlsx-closure-balances'
import { putContents, putExtents, putFormations } from './xlsx-closure-reactions'
import { type ClosureSheet, closureSheetName, limitCell, throughputCell, usualClosureLimit } from './xlsx-closure-sheet'
import { putStreamChecks } from './xlsx-closure-streams'
import { paper, setUpPage } from './xlsx-page'
import type { Places } from './xlsx-stream-table'
import * as style from './xlsx-styles'

const widths = [34, 28, 9, 14, 14, 14, 14, 24, 10, 9, 26]
const heads = [
  'Unit or stream',
  'Component',
  'Unit',
  'In',
  'Out',
  'Formed by reactions',
  'Gain of what is held',
  'Difference',
  '% of in',
  'Unknown values',
  'Finding',
]

/** Balances of every unit and of the whole process as live formulas over the stream table, so that a reader can verify them. */
export function addClosureSheet(
  workbook: Workbook,
  table: StreamTable,
  closure: ClosureModel,
  title: TitleBlock,
  places: Places,
  limit = usualClosureLimit,
): void {
  const sheet = workbook.addWorksheet(closureSheetName)
  widths.forEach((width, index) => {
    sheet.getColumn(index + 1).width = width
  })
  const flows = table.streams.map((_, stream) => places.cell(rowKey('flow', null), stream).value ?? 0)
  const throughput = flows.reduce((most, flow) => Math.max(most, Math.abs(flow)), 0)
  const context: ClosureSheet = {
    sheet,
    table,
    closure,
    places,
    limit,
    throughput,
    differenceFormat: fixedFormat(0, Math.min(8, decimalsFor(throughput || 1, 6))),
    extents: [],
    formations: [],
    contents: [],
  }
  putHead(context)
  const headRow = lastRowOf(sheet)
  sheet.views = [{ state: 'frozen', xSplit: 2, ySplit: headRow, showGridLines: false }]
  putExtents(context)
  putFormations(context)
  putContents(context)
  for (const group of closure.groups) putGroup(context, group)
  putStreamChecks(context)
  workbook.definedNames.add(`'${closureSheetName}'!${limitCell}`, 'ClosureLimit')
  workbook.definedNames.add(`'${closureSheetName}'!${throughputCell}`, 'LargestFlow')
  setUpPage(sheet, title, { paperSize: paper.a4, printTitlesRow: `${headRow}:${headRow}` })
}

function putHead({ sheet, table, places, limit, throughput }: ClosureSheet): void {
  putText(nextRow(sheet, 22).getCell(1), 'Closure, by live formulas over the stream table', style.title)
  const line = nextRow(sheet)
  putText(line.getCell(1), 'Counts as closed: a difference of at most', style.plain)
  putNumber(line.getCell(4), limit, '0.###', style.figure)
  putText(line.getCell(5), '% of what enters or leaves. Change it here.', style.plain)
  const largest = nextRow(sheet)
  putText(largest.getCell(1), `Largest total flow, ${table.flowUnit}`, style.plain)
  const key = rowKey('flow', null)
  const last = table.streams.length - 1
  const row = last < 0 ? '0' : `${places.ref(key, 0)}:${places.ref(key, last).split('!')[1]}`
  const formula = `MAX(MAX(${row}),0-MIN(${row}),0)`
  putLive(largest.getCell(4), { formula, result: throughput }, numberFormat(throughput, 6), style.figure)
  putText(largest.getCell(5), 'Difference = in - out + formed - gain of what is held', style.plain)
  const headLine = nextRow(sheet, 28)
  heads.forEach((text, index) => {
    putText(headLine.getCell(index + 1), text, index < 3 || index === 10 ? style.headLeft : style.head)
  })
}
