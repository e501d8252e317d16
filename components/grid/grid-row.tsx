import { memo, type ReactNode } from 'react'
import { type GridPlace, type GridRow, type GridSource, NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import type { GridColumns } from '@/hooks/use-grid-columns'
import type { GridScroll } from '@/hooks/use-grid-scroll'
import { GridCell } from './grid-cell'

export const cellId = (grid: string, row: string, column: string): string => `${grid}~${row}~${column}`

type GridRowProps = {
  grid: string
  source: GridSource
  row: GridRow
  rowIndex: number
  columns: GridColumns
  from: number
  to: number
  laneRef: GridScroll['lane']
  /** px from the top of the pane; undefined in the frozen head. */
  top?: number | undefined
  /** Index of the column that holds the tab stop, -1: in another row. */
  tabStop: number
  /** Selected columns, both ends in; -1, -1: none. */
  selectedFrom: number
  selectedTo: number
  /** The editor, when it stands in this row. */
  editor: ReactNode
  editing: string | null
  wave: ReadonlyMap<string, number> | null
}

/** One row: its frozen head and the lane of the streams in sight. */
export const GridRowView = memo(function GridRowView(props: GridRowProps) {
  const { grid, source, row, columns, from, to, tabStop } = props
  const head = props.rowIndex <= source.frozen
  // The first frozen row names the columns; the others under it can be empty.
  const isHeading = head && props.rowIndex === 1
  const cell = (column: string, index: number, left: number | undefined, width: number) => {
    if (props.editing === column)
      return (
        <div key={column} className="grid-editing" style={{ left, width }}>
          {props.editor}
        </div>
      )
    const place: GridPlace = { row: row.id, column }
    const view = source.view(place)
    return (
      <GridCell
        key={column}
        id={cellId(grid, row.id, column)}
        row={row.id}
        column={column}
        role={column === NAME_COLUMN ? 'rowheader' : isHeading && column !== UNIT_COLUMN ? 'columnheader' : 'gridcell'}
        columnIndex={index + 1}
        left={left}
        width={width}
        text={view.text}
        aside={view.aside}
        label={view.label}
        tone={view.tone}
        bold={view.bold}
        mark={view.mark}
        kept={view.kept}
        readings={view.readings}
        description={view.description}
        capped={view.capped}
        selected={index >= props.selectedFrom && index <= props.selectedTo}
        tabStop={index === tabStop}
        readOnly={source.isReadOnly(place)}
        wave={props.wave?.get(`${row.id}~${column}`)}
      />
    )
  }
  const style = { height: row.size, ...(props.top === undefined ? {} : { transform: `translateY(${props.top}px)` }) }
  if (row.section) {
    const view = source.view({ row: row.id, column: NAME_COLUMN })
    return (
      // biome-ignore lint/a11y/useFocusableInteractive: in a grid the cells take the focus, not the row
      <div role="row" aria-rowindex={props.rowIndex} className="grid-row grid-row-section" style={style}>
        <GridCell
          id={cellId(grid, row.id, NAME_COLUMN)}
          row={row.id}
          column={NAME_COLUMN}
          role="rowheader"
          columnIndex={1}
          span={columns.ids.length}
          text={view.text}
          aside={view.aside}
          label={view.label}
          tone="section"
          selected={props.selectedFrom === 0}
          tabStop={tabStop >= 0}
          readOnly
          expanded={row.section.open}
        />
      </div>
    )
  }
  const lane: ReactNode[] = []
  const lanePlace = (index: number) => {
    const id = columns.streams[index]
    if (id !== undefined) lane.push(cell(id, index + 2, columns.offsets[index], columns.sizes[index] ?? 0))
  }
  const stop = tabStop - 2
  if (stop >= 0 && stop < from) lanePlace(stop)
  for (let index = from; index <= to; index++) lanePlace(index)
  if (stop > to) lanePlace(stop)
  return (
    // biome-ignore lint/a11y/useFocusableInteractive: in a grid the cells take the focus, not the row
    <div
      role="row"
      aria-rowindex={props.rowIndex}
      className={props.editing === null ? 'grid-row' : 'grid-row grid-row-editing'}
      style={style}
      data-tone={head ? 'head' : undefined}
    >
      {cell(NAME_COLUMN, 0, undefined, columns.nameSize)}
      {cell(UNIT_COLUMN, 1, undefined, columns.unitSize)}
      <div className="grid-lane">
        <div ref={props.laneRef} className="grid-lane-inner">
          {lane}
        </div>
      </div>
    </div>
  )
})
