import type { LabPlace } from '../model'

/** A cell that says itself what it is: a number or a date of a workbook, a formula without its result. `text` is how it reads. */
export type TypedCell = { text: string; number?: number; percent?: true; date?: string; missing?: true }
export type Cell = string | TypedCell

export type Separator = '\t' | ';' | ',' | '|' | 'spaces'

/** One sheet, or the whole of a text: rows of cells, ragged, with the row numbers a person sees. */
export type Grid = {
  rows: Cell[][]
  rowNumbers: number[]
  sheet?: string
  separator?: Separator
}

/** A rectangle of a grid, as it stands or turned. Row 0 holds the heads. */
export type Frame = {
  height: number
  width: number
  at: (row: number, column: number) => Cell
  place: (row: number, column: number) => LabPlace
}

export function textOf(cell: Cell | undefined): string {
  return cell === undefined ? '' : typeof cell === 'string' ? cell : cell.text
}

export function isBlank(cell: Cell | undefined): boolean {
  return cell === undefined || (typeof cell === 'string' ? cell === '' || cell.trim() === '' : false)
}

/** The cell's text as the table has it, without the white space around it. */
export function rawOf(cell: Cell | undefined): string {
  return textOf(cell).trim()
}

export function placeIn(grid: Grid, row: number, column: number): LabPlace {
  return {
    ...(grid.sheet !== undefined && { sheet: grid.sheet }),
    row: grid.rowNumbers[row] ?? row + 1,
    column: column + 1,
    raw: rawOf(grid.rows[row]?.[column]),
  }
}

/** The frame of some rows and columns of a grid; `turned` makes its columns the rows. */
export function frameOf(grid: Grid, rows: number[], columns: number[], turned: boolean): Frame {
  const [down, across] = turned ? [columns, rows] : [rows, columns]
  const at = (row: number, column: number): Cell =>
    (turned
      ? grid.rows[across[column] as number]?.[down[row] as number]
      : grid.rows[down[row] as number]?.[across[column] as number]) ?? ''
  const place = (row: number, column: number): LabPlace =>
    turned
      ? placeIn(grid, across[column] as number, down[row] as number)
      : placeIn(grid, down[row] as number, across[column] as number)
  return { height: down.length, width: across.length, at, place }
}
