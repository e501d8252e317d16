import { type Cell, isOneCell, type Lines, rangeOf, type Selection, selectAll, selectCell } from './selection'

export type Grid = Lines & {
  /** Rows of one screenful, for the Page keys. */
  pageRows: number
  /** Whether a cell shows anything: Ctrl with an arrow stops at the edge of filled blocks. */
  isFilled: (cell: Cell) => boolean
}

/** `ctrl` is Ctrl, or Cmd on a Mac. */
export type KeyPress = { key: string; shift: boolean; ctrl: boolean }

const arrows: Readonly<Record<string, readonly [down: number, right: number]>> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
}

/**
 * Where a key leads, as in a spreadsheet; undefined when the key is not ours. Tab in the last cell and Shift+Tab in the
 * first are not ours either, so that the keyboard can leave the grid.
 */
export function nextSelection(grid: Grid, selection: Selection, press: KeyPress): Selection | undefined {
  if (grid.rows.length === 0 || grid.columns.length === 0) return undefined
  const { key, shift, ctrl } = press
  if (key === 'a' && ctrl && !shift) return selectAll(grid, selection)
  if (key === 'Tab' && !ctrl) return tabbed(grid, selection, shift)
  if (key === 'Enter' && !ctrl) return entered(grid, selection, shift)
  const from = shift ? selection.focus : selection.active
  const to = target(grid, from, key, ctrl)
  if (!to) return undefined
  return shift ? { active: selection.active, anchor: selection.anchor, focus: to } : selectCell(to)
}

function target(grid: Grid, from: Cell, key: string, ctrl: boolean): Cell | undefined {
  const { rows, columns, pageRows } = grid
  const [row, column] = [Math.max(rows.indexOf(from.row), 0), Math.max(columns.indexOf(from.column), 0)]
  const last = { row: rows.length - 1, column: columns.length - 1 }
  const arrow = arrows[key]
  if (arrow) return ctrl ? jump(grid, row, column, arrow) : cellAt(grid, row + arrow[0], column + arrow[1])
  switch (key) {
    case 'Home':
      return cellAt(grid, ctrl ? 0 : row, 0)
    case 'End':
      return cellAt(grid, ctrl ? last.row : row, last.column)
    case 'PageUp':
      return ctrl ? undefined : cellAt(grid, row - Math.max(pageRows, 1), column)
    case 'PageDown':
      return ctrl ? undefined : cellAt(grid, row + Math.max(pageRows, 1), column)
    default:
      return undefined
  }
}

/** To the last filled cell of the block, or over the gap to the next filled one, or to the edge. */
function jump(grid: Grid, row: number, column: number, [down, right]: readonly [number, number]): Cell {
  const inside = (r: number, c: number): boolean => r >= 0 && c >= 0 && r < grid.rows.length && c < grid.columns.length
  const filled = (r: number, c: number): boolean => grid.isFilled(cellAt(grid, r, c))
  let [r, c] = [row, column]
  if (!inside(r + down, c + right)) return cellAt(grid, r, c)
  const inBlock = filled(r, c) && filled(r + down, c + right)
  do {
    r += down
    c += right
  } while (inside(r + down, c + right) && (inBlock ? filled(r + down, c + right) : !filled(r, c)))
  return cellAt(grid, r, c)
}

/** Cell by cell, row by row; within a range round and round, within the grid to its end. */
function tabbed(grid: Grid, selection: Selection, back: boolean): Selection | undefined {
  const range = isOneCell(selection) ? grid : rangeOf(grid, selection)
  const { rows, columns } = range
  const at = rows.indexOf(selection.active.row) * columns.length + columns.indexOf(selection.active.column)
  const count = rows.length * columns.length
  let next = at + (back ? -1 : 1)
  if (range === grid) {
    if (next < 0 || next >= count) return undefined
    const tabColumn = selection.tabColumn ?? selection.active.column
    return { ...selectCell(byIndex(range, next)), tabColumn }
  }
  next = (next + count) % count
  return { ...selection, active: byIndex(range, next) }
}

/** Down, or up with Shift; within a range column by column, round and round. */
function entered(grid: Grid, selection: Selection, back: boolean): Selection {
  const step = back ? -1 : 1
  if (isOneCell(selection)) {
    const row = grid.rows.indexOf(selection.active.row)
    const column = grid.columns.indexOf(selection.tabColumn ?? selection.active.column)
    return selectCell(cellAt(grid, row + step, column))
  }
  const { rows, columns } = rangeOf(grid, selection)
  const count = rows.length * columns.length
  const at = columns.indexOf(selection.active.column) * rows.length + rows.indexOf(selection.active.row)
  const next = (at + step + count) % count
  const active = cellAt({ rows, columns }, next % rows.length, Math.floor(next / rows.length))
  return { ...selection, active }
}

const byIndex = (lines: Lines, index: number): Cell =>
  cellAt(lines, Math.floor(index / lines.columns.length), index % lines.columns.length)

/** The cell at these indexes, or the nearest that there is. */
function cellAt({ rows, columns }: Lines, row: number, column: number): Cell {
  const clamp = (index: number, length: number): number => Math.min(Math.max(index, 0), length - 1)
  return {
    row: rows[clamp(row, rows.length)] as string,
    column: columns[clamp(column, columns.length)] as string,
  }
}
