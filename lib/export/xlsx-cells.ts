import type { Cell, Row, Style, Worksheet } from 'exceljs'
import { cellText, looksLikeFormula } from './safe-text'

/** "AB" of column 28. */
export function columnLetters(column: number): string {
  let letters = ''
  for (let rest = column; rest > 0; rest = Math.floor((rest - 1) / 26))
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters
  return letters
}

export const address = (column: number, row: number): string => `${columnLetters(column)}${row}`

/**
 * Writes text as text. What looks like a formula also gets the text format, so that it stays text when somebody
 * edits the cell. Nothing that a person typed may reach a cell by another way.
 */
export function putText(cell: Cell, text: string, style: Partial<Style>): void {
  cell.value = text === '' ? null : cellText(text)
  cell.style = looksLikeFormula(text) ? { ...style, numFmt: '@' } : style
}

export function putNumber(cell: Cell, value: number, format: string, style: Partial<Style>): void {
  if (!Number.isFinite(value)) throw new Error(`Cell ${cell.address}: ${value} is no number that a workbook can hold`)
  cell.value = value
  cell.style = { ...style, numFmt: format }
}

/** A formula with the value it has now, for readers that do not calculate. */
export type Live = { formula: string; result: number | string }

export function putLive(cell: Cell, live: Live, format: string | null, style: Partial<Style>): void {
  cell.value = { formula: live.formula, result: live.result }
  cell.style = format === null ? style : { ...style, numFmt: format }
}

/** Number of the last row written. The library's own count looks at every cell of the sheet each time. */
export const lastRowOf = (sheet: Worksheet): number => sheet.lastRow?.number ?? 0

/** A row under the last one written. */
export function nextRow(sheet: Worksheet, height?: number): Row {
  const row = sheet.getRow(lastRowOf(sheet) + 1)
  if (height !== undefined) row.height = height
  return row
}

/** Fills cells of a row from `from` to `to` with one style and no value. */
export function fillRow(row: Row, from: number, to: number, style: Partial<Style>): void {
  for (let column = from; column <= to; column++) row.getCell(column).style = style
}
