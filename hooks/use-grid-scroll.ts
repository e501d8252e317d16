import { useVirtualizer } from '@tanstack/react-virtual'
import { type RefObject, useCallback, useEffect, useLayoutEffect, useRef, useState } from 'react'
import type { GridColumns } from './use-grid-columns'

export type GridScroll = {
  /** First and last stream column that is drawn. */
  from: number
  to: number
  /** Brings a stream column into sight; the frozen columns cover part of the scroller. */
  showColumn: (streamIndex: number) => void
  /** A row's lane gives itself here while it is mounted, and is then moved along. */
  lane: (element: HTMLElement | null) => (() => void) | undefined
}

/**
 * The one horizontal scroller of the sheet. The panes stay put inside it (sticky) and their lanes are moved, so that heads,
 * table and connections can never stand askew. Each lane is moved by itself: a custom property on a common ancestor
 * would make the browser work out the style of every cell anew in every frame.
 */
export function useGridScroll(scroller: RefObject<HTMLDivElement | null>, columns: GridColumns): GridScroll {
  const lanes = useRef(new Set<HTMLElement>())
  const { sizes, offsets, frozenSize, totalSize } = columns
  const virtualizer = useVirtualizer({
    horizontal: true,
    count: sizes.length,
    getScrollElement: () => scroller.current,
    estimateSize: (index) => sizes[index] ?? 0,
    overscan: 2,
    useFlushSync: false,
  })
  useLayoutEffect(() => {
    // Widths are the table's; a new list of them makes the measured ones void.
    if (sizes) virtualizer.measure()
  }, [virtualizer, sizes])
  useEffect(() => {
    const element = scroller.current
    if (!element) return
    const follow = () => {
      const shift = shiftBy(element)
      for (const lane of lanes.current) lane.style.transform = shift
    }
    follow()
    element.addEventListener('scroll', follow, { passive: true })
    return () => element.removeEventListener('scroll', follow)
  }, [scroller])
  const lane = useCallback(
    (element: HTMLElement | null) => {
      if (!element) return
      lanes.current.add(element)
      element.style.transform = shiftBy(scroller.current)
      return () => {
        lanes.current.delete(element)
      }
    },
    [scroller],
  )
  const showColumn = useCallback(
    (index: number) => {
      const element = scroller.current
      const start = offsets[index]
      const end = offsets[index + 1]
      if (!element || start === undefined || end === undefined) return
      const room = element.clientWidth - frozenSize
      if (start < element.scrollLeft) element.scrollLeft = start
      else if (end > element.scrollLeft + room) element.scrollLeft = Math.min(end - room, totalSize)
    },
    [scroller, offsets, frozenSize, totalSize],
  )
  const items = virtualizer.getVirtualItems()
  return { from: items[0]?.index ?? 0, to: items[items.length - 1]?.index ?? -1, showColumn, lane }
}

const shiftBy = (scroller: HTMLElement | null): string => `translateX(${-(scroller?.scrollLeft ?? 0)}px)`

/** The inner size of an element, kept up to date; 0 before it is there. */
export function useRoom(element: RefObject<HTMLElement | null>): { width: number; height: number } {
  const [room, setRoom] = useState({ width: 0, height: 0 })
  useLayoutEffect(() => {
    const target = element.current
    if (!target) return
    const read = () => {
      const next = { width: target.clientWidth, height: target.clientHeight }
      setRoom((last) => (last.width === next.width && last.height === next.height ? last : next))
    }
    read()
    const observer = new ResizeObserver(read)
    observer.observe(target)
    return () => observer.disconnect()
  }, [element])
  return room
}
