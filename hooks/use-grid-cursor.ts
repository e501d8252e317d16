import { useCallback, useMemo, useRef, useState } from 'react'
import {
  type Cell,
  extendTo,
  isOneCell,
  keepSelection,
  type Lines,
  rangeOf,
  type Selection,
  selectCell,
} from '@/lib/sheet/selection'
import type { GridEdit, GridRow } from './grid-model'

/** The selected block by the indexes of the screen, both ends in. */
export type CursorBox = { rowFrom: number; rowTo: number; columnFrom: number; columnTo: number }

export type GridCursor = {
  selection: Selection
  /** All rows and columns, in the order shown. */
  lines: Lines
  /** The selected block, section headings left out. */
  range: Lines
  box: CursorBox
  isOne: boolean
  edit: GridEdit | null
  setSelection: (selection: Selection) => void
  select: (cell: Cell, extend?: boolean) => void
  setEdit: (edit: GridEdit | null) => void
}

/**
 * Where one pane's cursor stands, by ids: what is inserted before it does not shift it, what is removed gives way.
 * `onLeft` is told of a refused entry that still stood in its cell when another cell is typed into.
 */
export function useGridCursor(
  rows: readonly GridRow[],
  columnIds: readonly string[],
  start: () => Cell,
  onLeft: (edit: GridEdit) => void,
): GridCursor {
  const [selection, setSelection] = useState<Selection>(() => selectCell(start()))
  const [edit, putEdit] = useState<GridEdit | null>(null)
  const open = useRef(edit)
  const setEdit = useCallback(
    (next: GridEdit | null) => {
      const was = open.current
      const elsewhere = was && next && (was.place.row !== next.place.row || was.place.column !== next.place.column)
      if (elsewhere && was.reason) onLeft(was)
      open.current = next
      putEdit(next)
    },
    [onLeft],
  )
  const lines = useMemo(() => ({ rows: rows.map(({ id }) => id), columns: columnIds }), [rows, columnIds])
  const [lastLines, setLastLines] = useState<Lines>(lines)
  let current = selection
  if (lines !== lastLines) {
    setLastLines(lines)
    current = keepSelection(selection, lastLines, lines) ?? selection
    if (current !== selection) setSelection(current)
  }
  const { anchor, focus } = current
  const box = useMemo(() => {
    const [r1, r2] = [lines.rows.indexOf(anchor.row), lines.rows.indexOf(focus.row)]
    const [c1, c2] = [lines.columns.indexOf(anchor.column), lines.columns.indexOf(focus.column)]
    return {
      rowFrom: Math.min(r1, r2),
      rowTo: Math.max(r1, r2),
      columnFrom: Math.min(c1, c2),
      columnTo: Math.max(c1, c2),
    }
  }, [lines, anchor.row, anchor.column, focus.row, focus.column])
  const range = useMemo(() => {
    const sections = new Set(rows.filter(({ section }) => section).map(({ id }) => id))
    const whole = rangeOf(lines, { active: anchor, anchor, focus })
    return { rows: whole.rows.filter((id) => !sections.has(id)), columns: whole.columns }
  }, [rows, lines, anchor, focus])
  const select = useCallback(
    (cell: Cell, extend = false) => setSelection((was) => (extend ? extendTo(was, cell) : selectCell(cell))),
    [],
  )
  return { selection: current, lines, range, box, isOne: isOneCell(current), edit, setSelection, select, setEdit }
}
