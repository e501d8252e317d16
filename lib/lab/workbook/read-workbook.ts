import ExcelJS from 'exceljs'
import { parseHead } from '../heads/head'
import { roleOf } from '../heads/roles'
import { limits } from '../limits'
import type { LabPlace } from '../model'
import { type Cell, type Grid, textOf } from '../table/grid'
import { headScore } from '../table/head-row'
import { cellOf } from './cell-of'
import { checkZip } from './zip-bounds'

/** Sheets as grids, and what was set aside: hidden sheets, rows and columns, formulas without a stored result. */
export type WorkbookRead = { ok: true; grids: Grid[]; listed: LabPlace[] } | { ok: false; problems: string[] }

/**
 * Reads the visible cells of an .xlsx workbook by their stored values. Nothing in it is run, followed or fetched:
 * macros, external links and formulas' texts are left alone. Its unpacked size is bounded before it is read.
 */
export async function readWorkbook(bytes: Uint8Array): Promise<WorkbookRead> {
  const checked = await checkZip(bytes)
  if (!checked.ok) return checked
  const workbook = new ExcelJS.Workbook()
  try {
    await workbook.xlsx.load(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer, {
      ignoreNodes: [
        'dataValidations',
        'conditionalFormatting',
        'drawing',
        'picture',
        'extLst',
        'tableParts',
        'printOptions',
      ],
    })
  } catch {
    return { ok: false, problems: ['This workbook is damaged: its sheets cannot be read.'] }
  }
  const grids: Grid[] = []
  const listed: LabPlace[] = []
  let rows = 0
  const named = workbook.worksheets.length > 1
  for (const sheet of workbook.worksheets) {
    if (sheet.state !== 'visible') {
      listed.push({ sheet: sheet.name, row: 1, column: 1, raw: sheet.name })
      continue
    }
    const grid = readSheet(sheet, named, listed)
    rows += grid.rows.length
    grids.push(grid)
  }
  if (rows > limits.rows + 1)
    return { ok: false, problems: [`The workbook has more than ${limits.rows.toLocaleString('en')} rows. Split it.`] }
  return { ok: true, grids, listed }
}

function readSheet(sheet: ExcelJS.Worksheet, named: boolean, listed: LabPlace[]): Grid {
  const grid: Grid = { rows: [], rowNumbers: [], ...(named && { sheet: sheet.name }) }
  const hidden = hiddenColumns(sheet)
  let last = 0
  sheet.eachRow({ includeEmpty: false }, (row, number) => {
    if (row.hidden) {
      for (const place of placesOf(row, number)) listed.push({ ...(named && { sheet: sheet.name }), ...place })
      return
    }
    // One blank row stands for any number of them: it parts tables all the same.
    if (number > last + 1 && last > 0) {
      grid.rows.push([])
      grid.rowNumbers.push(number - 1)
    }
    last = number
    const cells: Cell[] = []
    row.eachCell({ includeEmpty: false }, (cell, column) => {
      if (column > limits.columns) return
      const read = isMergedAway(cell) ? mergedText(cell) : cellOf(cell)
      const place = { ...(named && { sheet: sheet.name }), row: number, column }
      while (cells.length < column - 1) cells.push('')
      if (hidden.has(column) && read !== '') {
        listed.push({ ...place, raw: textOf(read).trim() })
        cells.push('')
      } else cells.push(read)
    })
    grid.rows.push(cells)
    grid.rowNumbers.push(number)
  })
  return grid
}

/** A merged block says its text once: in its first cell. */
const isMergedAway = (cell: ExcelJS.Cell): boolean => cell.isMerged && cell.master.address !== cell.address

/** A sample's id merged over its rows holds for each of them; heads merged downwards say their word once. */
function mergedText(cell: ExcelJS.Cell): Cell {
  const read = cellOf(cell.master)
  const sameColumn = cell.master.fullAddress.col === cell.fullAddress.col
  if (!sameColumn) return ''
  const text = textOf(read)
  return roleOf(parseHead(text).name) !== undefined || headScore(text) > 0 ? '' : read
}

function hiddenColumns(sheet: ExcelJS.Worksheet): Set<number> {
  const hidden = new Set<number>()
  for (const column of sheet.columns ?? []) if (column.hidden && column.number !== undefined) hidden.add(column.number)
  return hidden
}

function placesOf(row: ExcelJS.Row, number: number): LabPlace[] {
  const places: LabPlace[] = []
  row.eachCell({ includeEmpty: false }, (cell, column) => {
    const read = cellOf(cell)
    const raw = textOf(read).trim()
    if (raw !== '' && !isMergedAway(cell)) places.push({ row: number, column, raw })
  })
  return places
}
