import { type KeyboardEvent, useCallback, useRef } from 'react'
import { flushSync } from 'react-dom'
import { type Grid, nextSelection } from '@/lib/sheet/cells'
import { selectCell } from '@/lib/sheet/selection'
import { type GridSource, isFilled, NAME_COLUMN, UNIT_COLUMN } from './grid-model'
import type { GridCursor } from './use-grid-cursor'

export type GridKeysInput = {
  source: GridSource
  cursor: GridCursor
  /** Rows that fit in the pane, for the Page keys. */
  pageRows: () => number
  undo: () => void
  redo: () => void
  /** Where the menu opens when a key asked for it. */
  placeOnScreen: () => { x: number; y: number }
}

const shifts: Record<string, { rows: number; columns: number }> = {
  ArrowLeft: { rows: 0, columns: -1 },
  ArrowRight: { rows: 0, columns: 1 },
  ArrowUp: { rows: -1, columns: 0 },
  ArrowDown: { rows: 1, columns: 0 },
}

/**
 * The lines that a key runs along. From a stream's cell section headings are stepped over, and Tab and Enter go from
 * stream to stream: the frozen heads are reached by arrows and Home.
 */
export function linesFor(source: GridSource, cursor: GridCursor, key: string, pageRows: number): Grid {
  const { column } = cursor.selection.active
  const inLead = column === NAME_COLUMN || column === UNIT_COLUMN
  const typing = (key === 'Tab' || key === 'Enter') && !inLead
  return {
    rows: source.rows.filter(({ section }) => !section || column === NAME_COLUMN).map(({ id }) => id),
    columns: typing
      ? cursor.lines.columns.filter((id) => id !== NAME_COLUMN && id !== UNIT_COLUMN)
      : cursor.lines.columns,
    pageRows,
    isFilled: (cell) => isFilled(source, cell),
  }
}

/** Every key of the grid while no cell is being typed into. Nothing is handled during IME composition. */
export function useGridKeys(input: GridKeysInput): (event: KeyboardEvent) => void {
  const latest = useRef(input)
  latest.current = input
  /** Esc lets the next Tab leave the grid, so that the keyboard is never caught in it. */
  const leaving = useRef(false)

  return useCallback((event: KeyboardEvent) => {
    if (event.nativeEvent.isComposing || event.keyCode === 229) return
    const { source, cursor, pageRows, undo, redo, placeOnScreen } = latest.current
    const { active } = cursor.selection
    const { key, shiftKey: shift } = event
    const control = event.ctrlKey || event.metaKey
    const done = () => event.preventDefault()
    const go = (): void => {
      const next = nextSelection(linesFor(source, cursor, key, pageRows()), cursor.selection, {
        key,
        shift,
        ctrl: control,
      })
      if (!next) return
      cursor.setSelection(next)
      done()
    }
    const wasLeaving = leaving.current
    if (key !== 'Shift' && key !== 'Control') leaving.current = false

    if (key === 'Tab') {
      if (!wasLeaving && !control && !event.altKey) go()
      return
    }
    if (key === 'Escape') {
      leaving.current = true
      cursor.select(active)
      return done()
    }
    if (event.altKey) {
      const by = shifts[key]
      if (!by || control || !source.shift) return
      source.shift(active, by)
      return done()
    }
    if (control) {
      const letter = key.toLowerCase()
      if (letter === 'z' || letter === 'y') {
        if (letter === 'y' || shift) redo()
        else undo()
        return done()
      }
      if (key === ' ') {
        selectLines(cursor, 'columns')
        return done()
      }
      return go()
    }
    if (key === 'ContextMenu' || (key === 'F10' && shift)) {
      source.menu?.(active, placeOnScreen())
      return done()
    }
    if (key === 'Delete' || key === 'Backspace') {
      source.clear(cursor.range)
      return done()
    }
    if (key === ' ' && shift) {
      selectLines(cursor, 'rows')
      return done()
    }
    if (key === ' ' || key === 'F2' || (key === 'Enter' && !shift && cursor.isOne)) {
      const section = source.rows.some((row) => row.id === active.row && row.section)
      const place = section ? { row: active.row, column: NAME_COLUMN } : active
      if (key !== 'F2' && source.activate?.(place, key === ' ' ? 'space' : 'enter')) return done()
      if (source.mayEdit(active)) {
        cursor.setEdit({ place: active, draft: source.editText(active), mode: 'edit', reason: null })
        return done()
      }
      return key === 'Enter' ? go() : done()
    }
    if (key.length === 1) {
      if (source.letter?.(active, key)) return done()
      if (!source.mayEdit(active)) return
      // Not prevented: the letter goes into the input that now has the focus, so that dead keys and IMEs work.
      flushSync(() => cursor.setEdit({ place: active, draft: '', mode: 'overwrite', reason: null }))
      return
    }
    go()
  }, [])
}

/** Whole rows or whole columns of what is selected. */
function selectLines(cursor: GridCursor, which: 'rows' | 'columns'): void {
  const { lines, box, selection } = cursor
  const first = lines[which === 'rows' ? 'columns' : 'rows'][0]
  const last = lines[which === 'rows' ? 'columns' : 'rows'].at(-1)
  if (first === undefined || last === undefined) return
  const at = (index: number, other: string) =>
    which === 'rows'
      ? { row: lines.rows[index] ?? '', column: other }
      : { row: other, column: lines.columns[index] ?? '' }
  const [from, to] = which === 'rows' ? [box.rowFrom, box.rowTo] : [box.columnFrom, box.columnTo]
  cursor.setSelection({ ...selectCell(selection.active), anchor: at(from, first), focus: at(to, last) })
}
