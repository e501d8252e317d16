'use client'

import { defaultRangeExtractor, type Range, useVirtualizer } from '@tanstack/react-virtual'
import { type MouseEvent, useCallback, useEffect, useLayoutEffect, useRef } from 'react'
import { ASKED, type GridPlace, type GridRow, type GridSource, NAME_COLUMN } from '@/hooks/grid-model'
import { useGridClipboard } from '@/hooks/use-grid-clipboard'
import type { GridColumns } from '@/hooks/use-grid-columns'
import type { GridCursor } from '@/hooks/use-grid-cursor'
import { linesFor, useGridKeys } from '@/hooks/use-grid-keys'
import { useGridMouse } from '@/hooks/use-grid-mouse'
import type { GridScroll } from '@/hooks/use-grid-scroll'
import { nextSelection } from '@/lib/sheet/cells'
import { type AfterEdit, CellEditor } from './cell-editor'
import { cellId, GridRowView } from './grid-row'

type GridPaneProps = {
  /** Unique in the page. */
  id: string
  source: GridSource
  columns: GridColumns
  scroll: GridScroll
  cursor: GridCursor
  undo: () => void
  redo: () => void
  onEnter: () => void
  wave: ReadonlyMap<string, number> | null
}

/** One pane of the sheet: frozen head rows over rows that scroll, both ways only as many cells as are in sight. */
export function GridPane(props: GridPaneProps) {
  const { id, source, columns, scroll, cursor, wave } = props
  const pane = useRef<HTMLDivElement>(null)
  const body = useRef<HTMLDivElement>(null)
  const { rows, frozen } = source
  const { selection, lines, box, edit, isOne } = cursor
  const { active, focus } = selection
  const scrolling = rows.length - frozen
  const activeRow = lines.rows.indexOf(active.row)
  const activeColumn = columns.indexOf.get(active.column) ?? -1
  const focusRow = lines.rows.indexOf(focus.row)
  const focusColumn = columns.indexOf.get(focus.column) ?? -1
  const activeBodyRow = activeRow - frozen
  const virtualizer = useVirtualizer({
    count: scrolling,
    getScrollElement: () => body.current,
    estimateSize: (index) => rows[index + frozen]?.size ?? 27,
    getItemKey: (index) => rows[index + frozen]?.id ?? index,
    overscan: 4,
    useFlushSync: false,
    // The row that holds the focus stays mounted, wherever the pane is scrolled to.
    rangeExtractor: useCallback(
      (range: Range) => {
        const indexes = defaultRangeExtractor(range)
        if (activeBodyRow < 0 || activeBodyRow >= range.count || indexes.includes(activeBodyRow)) return indexes
        return [...indexes, activeBodyRow].sort((a, b) => a - b)
      },
      [activeBodyRow],
    ),
  })
  useLayoutEffect(() => {
    if (rows) virtualizer.measure()
  }, [virtualizer, rows])

  const focusActive = useCallback(() => {
    const place = cursorPlace(rows[activeRow], active)
    document.getElementById(cellId(id, place.row, place.column))?.focus({ preventScroll: true })
  }, [id, rows, activeRow, active])
  const isFocused = useRef(false)
  useEffect(() => {
    if (focusRow >= frozen) virtualizer.scrollToIndex(focusRow - frozen, { align: 'auto' })
    if (focusColumn >= 2) scroll.showColumn(focusColumn - 2)
  }, [focusRow, focusColumn, frozen, virtualizer, scroll.showColumn])
  useEffect(() => {
    const typing = pane.current?.querySelector('input:focus')
    if (isFocused.current && !typing && (!edit || edit.reason)) focusActive()
  }, [focusActive, edit])

  const pageRows = useCallback(() => Math.max(1, Math.floor((body.current?.clientHeight ?? 270) / 27) - 1), [])
  const placeOnScreen = useCallback(() => {
    const place = cursorPlace(rows[activeRow], active)
    const rect = document.getElementById(cellId(id, place.row, place.column))?.getBoundingClientRect()
    return { x: (rect?.left ?? 0) + 12, y: rect?.bottom ?? 0 }
  }, [id, rows, activeRow, active])
  const onKeyDown = useGridKeys({ ...props, pageRows, placeOnScreen })
  const clipboard = useGridClipboard(source, cursor)
  const mouse = useGridMouse(source, cursor, pane)

  const commit = (text: string, after: AfterEdit) => {
    if (!edit) return
    const reason = source.commit(edit.place, text)
    if (typeof reason === 'string') return cursor.setEdit({ ...edit, draft: text, reason })
    cursor.setEdit(null)
    if (reason === ASKED) return
    if (after === null) {
      isFocused.current = pane.current?.contains(document.activeElement) ?? false
      return
    }
    const next = nextSelection(linesFor(source, cursor, after.key, 1), selection, { ...after, ctrl: false })
    if (next) cursor.setSelection(next)
  }
  const editor = edit ? (
    <CellEditor
      edit={edit}
      label={source.view(edit.place).label}
      side={edit.place.column === NAME_COLUMN ? 'start' : 'end'}
      words={source.suggestions?.(edit.place) ?? []}
      onCommit={commit}
      onCancel={() => cursor.setEdit(null)}
    />
  ) : null
  const drawRow = (row: GridRow, index: number, top: number | undefined) => {
    const here = activeRow === index
    const isIn = !isOne && index >= box.rowFrom && index <= box.rowTo
    const editing = edit?.place.row === row.id ? edit.place.column : null
    return (
      <GridRowView
        key={row.id}
        grid={id}
        source={source}
        row={row}
        rowIndex={index + 1}
        columns={columns}
        from={scroll.from}
        to={scroll.to}
        laneRef={scroll.lane}
        top={top}
        tabStop={here ? activeColumn : -1}
        selectedFrom={isIn ? box.columnFrom : -1}
        selectedTo={isIn ? box.columnTo : -1}
        editor={editing === null ? null : editor}
        editing={editing}
        wave={wave}
      />
    )
  }
  return (
    <div
      ref={pane}
      id={id}
      role="grid"
      aria-label={source.label}
      aria-rowcount={rows.length}
      aria-colcount={columns.ids.length}
      aria-multiselectable="true"
      className="grid-pane"
      onKeyDown={onKeyDown}
      onFocus={() => {
        isFocused.current = true
        props.onEnter()
      }}
      onBlur={(event) => {
        if (event.relatedTarget && !pane.current?.contains(event.relatedTarget)) isFocused.current = false
      }}
      {...clipboard}
      {...mouse}
    >
      {frozen > 0 ? (
        <div role="rowgroup" className="grid-head">
          {rows.slice(0, frozen).map((row, index) => drawRow(row, index, undefined))}
        </div>
      ) : null}
      <div
        role="rowgroup"
        ref={body}
        className="grid-body"
        tabIndex={-1}
        onMouseDown={(event: MouseEvent) => {
          // A press on the scrollbar or beside the rows must not take the focus from the cell.
          if (event.target === event.currentTarget) event.preventDefault()
        }}
      >
        <div className="grid-space" role="presentation" style={{ height: virtualizer.getTotalSize() }}>
          {virtualizer.getVirtualItems().map((item) => {
            const row = rows[item.index + frozen]
            return row ? drawRow(row, item.index + frozen, item.start) : null
          })}
        </div>
      </div>
    </div>
  )
}

/** In a section's heading the one cell stands for the whole row. */
function cursorPlace(row: GridRow | undefined, active: GridPlace): GridPlace {
  return row?.section ? { row: active.row, column: NAME_COLUMN } : active
}
