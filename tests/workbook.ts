import * as SheetJs from 'xlsx'
import calculate from 'xlsx-calc'

/** Workbooks read by another library than the one that wrote them, and calculated by a third. */
export type Sheet = SheetJs.WorkSheet
export type Cell = SheetJs.CellObject

export const readWorkbook = (bytes: Uint8Array): SheetJs.WorkBook =>
  SheetJs.read(bytes, {
    type: 'array',
    cellFormula: true,
    cellNF: true,
    cellStyles: true,
    bookVBA: true,
    bookFiles: true,
  })

export const sheetOf = (workbook: SheetJs.WorkBook, name: string): Sheet => {
  const sheet = workbook.Sheets[name]
  if (!sheet) throw new Error(`No sheet ${name} in ${workbook.SheetNames.join(', ')}`)
  return sheet
}

export const cellAt = (sheet: Sheet, address: string): Cell | undefined => sheet[address] as Cell | undefined

/** Every cell with its address. */
export const cellsOf = (sheet: Sheet): [address: string, cell: Cell][] =>
  Object.entries(sheet).filter(([address]) => !address.startsWith('!')) as [string, Cell][]

/** Rows of a sheet as values, blanks as null. */
export const rowsOf = (sheet: Sheet): (string | number | null)[][] =>
  SheetJs.utils.sheet_to_json(sheet, { header: 1, defval: null, raw: true, blankrows: true })

/** The first row whose first cells read like `start`, with its number in the sheet (from 1). */
export function rowStarting(sheet: Sheet, ...start: string[]): { number: number; values: (string | number | null)[] } {
  const rows = rowsOf(sheet)
  const index = rows.findIndex((row) => start.every((text, at) => row[at] === text))
  if (index < 0) throw new Error(`No row starts with ${start.join(', ')}`)
  return { number: index + 1, values: rows[index] ?? [] }
}

/** The stored results of all formulas are thrown away, then calculated again. Returns how many there were. */
export function recalculate(workbook: SheetJs.WorkBook): number {
  let formulas = 0
  for (const sheet of Object.values(workbook.Sheets))
    for (const [, cell] of cellsOf(sheet)) {
      if (cell.f === undefined) continue
      formulas += 1
      delete cell.v
      delete cell.w
    }
  const count = (...values: unknown[]): number =>
    (values.flat(3) as unknown[]).filter((v) => typeof v === 'number').length
  calculate.import_functions({ COUNT: count })
  calculate(workbook)
  return formulas
}
