import { type Cell, type Lines, rangeOf, type Selection } from './selection'

export type PlacedCell = Cell & { text: string }

export type Placement = {
  cells: PlacedCell[]
  /** Texts that fall beyond the last row or column, by their place in the block: never dropped unsaid. */
  outside: { row: number; column: number; text: string }[]
  /** Rows and columns that would have to be added for the block to fit. */
  missing: { rows: number; columns: number }
  /** Rows of the block differ in length: cells that a short row lacks are left as they are. */
  ragged: boolean
  /** What is selected afterwards; undefined when nothing fell on the grid. */
  selection: Selection | undefined
}

/**
 * Lays a block on the grid from the top left corner of the selection. A selection that is a whole multiple of the block is
 * filled with copies of it, so one cell fills a range; otherwise the block is laid once, at its own size.
 */
export function placeBlock(grid: Lines, selection: Selection, block: readonly (readonly string[])[]): Placement {
  const width = Math.max(0, ...block.map((row) => row.length))
  const height = block.length
  const range = rangeOf(grid, selection)
  const top = grid.rows.indexOf(range.rows[0] ?? '')
  const left = grid.columns.indexOf(range.columns[0] ?? '')
  const ragged = block.some((row) => row.length !== width)
  const none = { cells: [], outside: [], missing: { rows: 0, columns: 0 }, ragged, selection: undefined }
  if (width === 0 || top < 0 || left < 0) return none
  const whole = (length: number, size: number): number => (length % size === 0 ? length / size : 1)
  const down = whole(range.rows.length, height)
  const across = whole(range.columns.length, width)
  const tiled = range.rows.length % height === 0 && range.columns.length % width === 0
  const [totalRows, totalColumns] = tiled ? [down * height, across * width] : [height, width]
  const cells: PlacedCell[] = []
  const outside: Placement['outside'] = []
  for (let r = 0; r < totalRows; r++)
    for (let c = 0; c < totalColumns; c++) {
      const text = block[r % height]?.[c % width]
      if (text === undefined) continue
      const [row, column] = [grid.rows[top + r], grid.columns[left + c]]
      if (row === undefined || column === undefined) outside.push({ row: r, column: c, text })
      else cells.push({ row, column, text })
    }
  return {
    cells,
    outside,
    missing: {
      rows: Math.max(0, top + totalRows - grid.rows.length),
      columns: Math.max(0, left + totalColumns - grid.columns.length),
    },
    ragged,
    selection: selectionOf(grid, top, left, totalRows, totalColumns),
  }
}

/** Fill down or right: which cell of the range each of its other cells copies. */
export function fillOf(grid: Lines, selection: Selection, way: 'down' | 'right'): { from: Cell; to: Cell }[] {
  const { rows, columns } = rangeOf(grid, selection)
  const pairs: { from: Cell; to: Cell }[] = []
  for (const [r, row] of rows.entries())
    for (const [c, column] of columns.entries()) {
      if ((way === 'down' ? r : c) === 0) continue
      const from = way === 'down' ? { row: rows[0] as string, column } : { row, column: columns[0] as string }
      pairs.push({ from, to: { row, column } })
    }
  return pairs
}

function selectionOf(grid: Lines, top: number, left: number, height: number, width: number): Selection {
  const at = (row: number, column: number): Cell => ({
    row: grid.rows[Math.min(row, grid.rows.length - 1)] as string,
    column: grid.columns[Math.min(column, grid.columns.length - 1)] as string,
  })
  const anchor = at(top, left)
  return { active: anchor, anchor, focus: at(top + height - 1, left + width - 1) }
}
