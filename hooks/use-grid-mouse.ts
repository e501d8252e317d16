import { type MouseEvent, type RefObject, useCallback, useEffect, useRef } from 'react'
import type { GridPlace, GridSource } from './grid-model'
import type { GridCursor } from './use-grid-cursor'

const placeOf = (target: EventTarget | null): GridPlace | null => {
  const cell = target instanceof Element ? target.closest<HTMLElement>('[data-row][data-column]') : null
  return cell ? { row: cell.dataset.row ?? '', column: cell.dataset.column ?? '' } : null
}
const isEditor = (target: EventTarget | null) => target instanceof Element && target.closest('.grid-editing') !== null

/** Press, drag, shift-press, double press and the context menu, for the whole pane at once. */
export function useGridMouse(source: GridSource, cursor: GridCursor, pane: RefObject<HTMLElement | null>) {
  const latest = useRef({ source, cursor })
  latest.current = { source, cursor }
  const drag = useRef<{ from: GridPlace; moved: boolean } | null>(null)
  const pressedTwice = useRef(false)

  useEffect(() => {
    const stop = () => {
      drag.current = null
    }
    window.addEventListener('mouseup', stop)
    return () => window.removeEventListener('mouseup', stop)
  }, [])

  const onMouseDown = useCallback(
    (event: MouseEvent) => {
      if (event.button !== 0 || isEditor(event.target)) return
      const place = placeOf(event.target)
      if (!place) return
      const { cursor } = latest.current
      // An open editor loses the focus first, and so takes what was typed.
      const focused = document.activeElement
      if (focused instanceof HTMLInputElement && pane.current?.contains(focused)) focused.blur()
      const { active } = cursor.selection
      pressedTwice.current = active.row === place.row && active.column === place.column
      cursor.select(place, event.shiftKey)
      drag.current = { from: place, moved: false }
    },
    [pane],
  )
  const onMouseOver = useCallback((event: MouseEvent) => {
    const held = drag.current
    const place = held && placeOf(event.target)
    if (!held || !place || event.buttons !== 1) return
    if (place.row === held.from.row && place.column === held.from.column && !held.moved) return
    held.moved = true
    latest.current.cursor.select(place, true)
  }, [])
  const onClick = useCallback((event: MouseEvent) => {
    const place = placeOf(event.target)
    if (!place || isEditor(event.target) || event.shiftKey) return
    const { source, cursor } = latest.current
    if (!cursor.isOne || source.activate?.(place, 'click')) return
    // A finger has no keys and no double press: a second tap on the chosen cell types into it.
    const touch = (event.nativeEvent as PointerEvent).pointerType === 'touch'
    if (touch && pressedTwice.current && source.mayEdit(place))
      cursor.setEdit({ place, draft: source.editText(place), mode: 'edit', reason: null })
  }, [])
  const onDoubleClick = useCallback((event: MouseEvent) => {
    const place = placeOf(event.target)
    const { source, cursor } = latest.current
    if (!place || !source.mayEdit(place)) return
    cursor.setEdit({ place, draft: source.editText(place), mode: 'edit', reason: null })
  }, [])
  const onContextMenu = useCallback((event: MouseEvent) => {
    const place = placeOf(event.target)
    const { source, cursor } = latest.current
    if (!place || !source.menu || isEditor(event.target)) return
    event.preventDefault()
    const { range } = cursor
    if (!range.rows.includes(place.row) || !range.columns.includes(place.column)) cursor.select(place)
    source.menu(place, { x: event.clientX, y: event.clientY })
  }, [])
  return { onMouseDown, onMouseOver, onClick, onDoubleClick, onContextMenu }
}
