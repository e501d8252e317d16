import type { Workbook, Worksheet } from 'exceljs'
import { cautions } from './caution'
import { numberFormat, typedFormat } from './number-format'
import { type ExportCell, type ExportRow, rowKey, type StreamTable, stateWords, taggedName } from './table-model'
import { statusOf, type TitleBlock, titleFields } from './title-block'
import { address, fillRow, lastRowOf, nextRow, putNumber, putText } from './xlsx-cells'
import { pagesWide, paper, setUpPage } from './xlsx-page'
import * as style from './xlsx-styles'

export const streamSheetName = 'Stream table'

/** Label, unit, then one column a stream. */
const firstStreamColumn = 3
/** The title block reaches this far even where there are few streams. */
const titleColumns = [1, 5, 9]
const lastTitleColumn = 12

/** Where the numbers ended up, for the formulas of the other sheets. */
export type Places = {
  /** Address of a cell, with the sheet's name. */
  ref: (key: string, stream: number) => string
  cell: (key: string, stream: number) => ExportCell
  /** A block of cells below each other in one stream. */
  span: (firstKey: string, lastKey: string, stream: number) => string
  has: (key: string) => boolean
}

export function addStreamSheet(workbook: Workbook, table: StreamTable, title: TitleBlock): Places {
  const sheet = workbook.addWorksheet(streamSheetName)
  const lastColumn = Math.max(lastTitleColumn, firstStreamColumn + table.streams.length - 1)
  setWidths(sheet, lastColumn)
  putTitle(sheet, table, title)
  const firstHead = lastRowOf(sheet) + 1
  putHeads(sheet, table)
  const lastHead = lastRowOf(sheet)
  sheet.views = [{ state: 'frozen', xSplit: firstStreamColumn - 1, ySplit: firstHead + 1, showGridLines: false }]
  const rows = new Map<string, { number: number; row: ExportRow }>()
  for (const block of table.blocks) {
    if (block.title !== null) putBand(sheet, block.title, table)
    for (const row of block.rows) rows.set(rowKey(row.measure, row.component), { number: putRow(sheet, row), row })
  }
  putCarried(sheet, table)
  putConnections(sheet, table)
  putLegend(sheet, table)
  setUpPage(sheet, title, {
    paperSize: paper.a3,
    fitToWidth: pagesWide(table.streams.length),
    printTitlesRow: `${firstHead}:${lastHead}`,
    printTitlesColumn: 'A:B',
  })
  const found = (key: string): { number: number; row: ExportRow } => {
    const place = rows.get(key)
    if (!place) throw new Error(`The stream table has no row ${key}`)
    return place
  }
  const quoted = `'${streamSheetName}'!`
  return {
    has: (key) => rows.has(key),
    ref: (key, stream) => quoted + address(firstStreamColumn + stream, found(key).number),
    span: (first, last, stream) =>
      `${quoted}${address(firstStreamColumn + stream, found(first).number)}:${address(firstStreamColumn + stream, found(last).number)}`,
    cell: (key, stream) => found(key).row.cells[stream] as ExportCell,
  }
}

function setWidths(sheet: Worksheet, lastColumn: number): void {
  sheet.getColumn(1).width = 32
  sheet.getColumn(2).width = 9
  for (let column = firstStreamColumn; column <= lastColumn; column++) sheet.getColumn(column).width = 12
}

function putTitle(sheet: Worksheet, table: StreamTable, title: TitleBlock): void {
  putText(nextRow(sheet, 24).getCell(1), title.title, style.title)
  const state = nextRow(sheet, 18)
  putText(state.getCell(1), statusOf(title), style.status)
  const { given, solvable, unknown, atOdds } = table.counts
  const counts = `${given} given, ${solvable} solvable now, ${unknown} still unknown, ${atOdds} at odds`
  putText(state.getCell(titleColumns[1] as number), counts, style.plain)
  const fields = titleFields(title)
  for (let at = 0; at < fields.length; at += titleColumns.length) {
    const row = nextRow(sheet)
    for (const [index, column] of titleColumns.entries()) {
      const [label, value] = fields[at + index] ?? ['', '']
      // The first label stands in the wide column, so its value can begin in the next; the others need one between.
      putText(row.getCell(column), label, style.fieldLabel)
      putText(row.getCell(column === 1 ? 2 : column + 1), value, style.fieldValue)
    }
  }
}

function putHeads(sheet: Worksheet, table: StreamTable): void {
  const tags = nextRow(sheet, 16)
  putText(tags.getCell(1), 'Stream', style.headLeft)
  putText(tags.getCell(2), 'Unit', style.headLeft)
  const names = nextRow(sheet, 36)
  const others = ['From', 'To', 'Phase'].map((label) => {
    const row = nextRow(sheet)
    putText(row.getCell(1), label, style.rowLabel)
    row.getCell(2).style = style.rowUnit
    return row
  })
  putText(names.getCell(1), 'Name', style.rowLabel)
  names.getCell(2).style = style.rowUnit
  table.streams.forEach((stream, index) => {
    const column = firstStreamColumn + index
    putText(tags.getCell(column), stream.tag, style.head)
    putText(names.getCell(column), stream.name, style.subHead)
    for (const [at, text] of [stream.from, stream.to, stream.phase].entries())
      putText(others[at]?.getCell(column) as never, text, style.subHead)
  })
}

function putBand(sheet: Worksheet, text: string, table: StreamTable): void {
  const row = nextRow(sheet, 15)
  fillRow(row, 1, firstStreamColumn + table.streams.length - 1, style.band)
  putText(row.getCell(1), text, style.band)
}

function putRow(sheet: Worksheet, row: ExportRow): number {
  const line = nextRow(sheet, 15)
  putText(line.getCell(1), row.label, row.component === null ? style.rowLabelStrong : style.rowLabel)
  putText(line.getCell(2), row.unit, style.rowUnit)
  row.cells.forEach((cell, stream) => {
    const target = line.getCell(firstStreamColumn + stream)
    const shade = style.stateStyles[cell.state]
    const look =
      row.component === null && cell.value !== null ? { ...shade, font: { ...shade.font, bold: true } } : shade
    if (cell.value === null) putText(target, style.stateMarks[cell.state], look)
    else {
      const format = cell.state === 'solvable' ? numberFormat : typedFormat
      putNumber(target, cell.value, format(cell.value, row.digits), look)
    }
  })
  return line.number
}

function putCarried(sheet: Worksheet, table: StreamTable): void {
  if (table.carried.length === 0) return
  putBand(sheet, 'Carried notes, not calculated', table)
  for (const { label, unit, texts } of table.carried) {
    const row = nextRow(sheet)
    putText(row.getCell(1), label, style.rowLabel)
    putText(row.getCell(2), unit, style.rowUnit)
    texts.forEach((text, stream) => {
      const cell = row.getCell(firstStreamColumn + stream)
      if (typeof text === 'number') putNumber(cell, text, typedFormat(text, 3), style.figure)
      else putText(cell, text ?? '', style.figure)
    })
  }
}

function putConnections(sheet: Worksheet, table: StreamTable): void {
  if (table.connections.length === 0) return
  putBand(sheet, 'Connections: in enters the unit, out leaves it', table)
  for (const { tag, name, unitKind, ends } of table.connections) {
    const row = nextRow(sheet)
    putText(row.getCell(1), taggedName({ tag, name }), style.rowLabel)
    putText(row.getCell(2), unitKind, style.rowUnit)
    ends.forEach((end, stream) => {
      putText(row.getCell(firstStreamColumn + stream), end ?? '', style.centred)
    })
  }
}

function putLegend(sheet: Worksheet, table: StreamTable): void {
  putBand(sheet, 'Legend', table)
  const samples = [
    ['given', 'number', 'typed by a person: see the sheet Givens for its source'],
    ['solvable', 'number', 'follows from the givens, the balances and the rules'],
    ['unknown', style.stateMarks.unknown, 'more values are needed before it follows; it is not zero'],
    ['atOdds', 'number', 'typed, and contradicts other givens: see the sheet Notes'],
    ['absent', style.stateMarks.absent, 'the component cannot be in that stream'],
    ['noMolarMass', style.stateMarks.noMolarMass, 'cannot be shown: a molar mass is missing'],
  ] as const
  for (const [state, sample, meaning] of samples) {
    const row = nextRow(sheet)
    putText(row.getCell(1), stateWords[state], style.rowLabel)
    putText(row.getCell(2), sample, style.stateStyles[state])
    putText(row.getCell(3), meaning, style.indented)
  }
  putBand(sheet, 'Caution', table)
  for (const caution of cautions) putText(nextRow(sheet).getCell(1), caution, style.plain)
}
