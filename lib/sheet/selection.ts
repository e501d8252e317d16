/** Cells and ranges by id, so that a selection stays on its stream and component when rows or columns move. */

export type Cell = { row: string; column: string }

export type Selection = {
  /** The cell that typing, F2 and the cell card act on; always inside the range. */
  active: Cell
  /** Corner where the range began. */
  anchor: Cell
  /** Corner that moves with Shift, and that is kept in view. */
  focus: Cell
  /** Column where a run of Tabs began: Enter goes back under it. */
  tabColumn?: string
}

/** Row and column ids in the order shown. */
export type Lines = { rows: readonly string[]; columns: readonly string[] }

export const selectCell = (cell: Cell): Selection => ({ active: cell, anchor: cell, focus: cell })

/** Click with Shift, or drag: the range from where it began to here. */
export const extendTo = (selection: Selection, focus: Cell): Selection => ({
  active: selection.anchor,
  anchor: selection.anchor,
  focus,
})

export function selectAll(lines: Lines, selection?: Selection): Selection | undefined {
  const [row, column] = [lines.rows[0], lines.columns[0]]
  const [lastRow, lastColumn] = [lines.rows.at(-1), lines.columns.at(-1)]
  if (row === undefined || column === undefined || lastRow === undefined || lastColumn === undefined) return undefined
  const anchor = { row, column }
  return { active: selection?.active ?? anchor, anchor, focus: { row: lastRow, column: lastColumn } }
}

/** Rows and columns of the range, in the order shown; without those that are no longer there. */
export function rangeOf(lines: Lines, { anchor, focus }: Selection): Lines {
  return {
    rows: between(lines.rows, anchor.row, focus.row),
    columns: between(lines.columns, anchor.column, focus.column),
  }
}

/** Cells of the range, row by row. */
export function cellsOf(lines: Lines, selection: Selection): Cell[] {
  const { rows, columns } = rangeOf(lines, selection)
  return rows.flatMap((row) => columns.map((column) => ({ row, column })))
}

export const isOneCell = ({ anchor, focus }: Selection): boolean =>
  anchor.row === focus.row && anchor.column === focus.column

/** The selection once rows or columns have gone or come: what is gone gives way to what stands in its place. */
export function keepSelection(selection: Selection, before: Lines, after: Lines): Selection | undefined {
  if (after.rows.length === 0 || after.columns.length === 0) return undefined
  const keep = (cell: Cell): Cell => ({
    row: keepLine(cell.row, before.rows, after.rows),
    column: keepLine(cell.column, before.columns, after.columns),
  })
  return { active: keep(selection.active), anchor: keep(selection.anchor), focus: keep(selection.focus) }
}

function keepLine(id: string, before: readonly string[], after: readonly string[]): string {
  if (after.includes(id)) return id
  const stays = new Set(after)
  const index = Math.max(before.indexOf(id), 0)
  const next = before.slice(index + 1).find((other) => stays.has(other))
  return next ?? before.slice(0, index).findLast((other) => stays.has(other)) ?? (after[0] as string)
}

function between(ids: readonly string[], one: string, other: string): readonly string[] {
  const [a, b] = [ids.indexOf(one), ids.indexOf(other)]
  if (a < 0 || b < 0) return ids.slice(Math.max(a, b, 0), Math.max(a, b) + 1)
  return ids.slice(Math.min(a, b), Math.max(a, b) + 1)
}
