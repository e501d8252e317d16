'use client'

import './grid.css'
import { type ReactNode, useRef } from 'react'
import { type GridColumns, useGridColumns } from '@/hooks/use-grid-columns'
import { type GridScroll, useGridScroll, useRoom } from '@/hooks/use-grid-scroll'

type GridSheetProps = {
  streamIds: readonly string[]
  /** Draws the panes that stand in the same columns. */
  children: (columns: GridColumns, scroll: GridScroll) => ReactNode
}

/** One sheet: panes one under the other in the same columns, with one horizontal scroller for them all. */
export function GridSheet({ streamIds, children }: GridSheetProps) {
  const scroller = useRef<HTMLDivElement>(null)
  const room = useRoom(scroller)
  const columns = useGridColumns(streamIds, room.width, room.width < 620)
  const scroll = useGridScroll(scroller, columns)
  return (
    <div ref={scroller} className="grid-scroller" tabIndex={-1}>
      <div style={{ width: columns.frozenSize + columns.totalSize, minWidth: '100%', height: '100%' }}>
        <div className="grid-stack" style={{ width: room.width || '100%' }}>
          {children(columns, scroll)}
        </div>
      </div>
    </div>
  )
}
