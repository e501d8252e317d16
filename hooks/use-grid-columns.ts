import {
  columnOrderingFeature,
  columnPinningFeature,
  columnSizingFeature,
  columnVisibilityFeature,
  createColumnHelper,
  tableFeatures,
  useTable,
} from '@tanstack/react-table'
import { useMemo } from 'react'
import { NAME_COLUMN, UNIT_COLUMN } from './grid-model'

const features = tableFeatures({
  columnVisibilityFeature,
  columnSizingFeature,
  columnPinningFeature,
  columnOrderingFeature,
})
const helper = createColumnHelper<typeof features, never>()
const noRows: never[] = []

export type GridColumns = {
  /** Frozen columns, then streams, as they stand on the screen. */
  ids: readonly string[]
  indexOf: ReadonlyMap<string, number>
  /** Frozen widths, px. */
  nameSize: number
  unitSize: number
  frozenSize: number
  /** The scrolling columns: ids, widths, and where each starts (one more entry than columns). */
  streams: readonly string[]
  sizes: readonly number[]
  offsets: readonly number[]
  totalSize: number
}

const LEAST = 64
const EASY = 74
const MOST = 104

/**
 * Order, visibility, widths and pinning of the sheet's columns, shared by the stream table and the connections under it.
 * Streams stretch to fill the room there is. Cells are not asked of the table: they are drawn from ids and typed arrays.
 */
export function useGridColumns(streamIds: readonly string[], room: number, narrow: boolean): GridColumns {
  const unitSize = narrow ? 58 : 60
  const left = room - unitSize - streamIds.length * EASY
  const nameSize = narrow ? 108 : Math.max(150, Math.min(200, left))
  const free = room - nameSize - unitSize - 2
  const size = Math.max(LEAST, Math.min(MOST, Math.floor(free / Math.max(1, streamIds.length))))
  const columns = useMemo(
    () =>
      helper.columns([
        helper.display({ id: NAME_COLUMN, size: nameSize }),
        helper.display({ id: UNIT_COLUMN, size: unitSize }),
        ...streamIds.map((id) => helper.display({ id, size })),
      ]),
    [streamIds, size, nameSize, unitSize],
  )
  const table = useTable({
    features,
    columns,
    data: noRows,
    initialState: { columnPinning: { start: [NAME_COLUMN, UNIT_COLUMN], end: [] } },
  })
  const center = table.getCenterVisibleLeafColumns()
  return useMemo(() => {
    const streams = center.map((column) => column.id)
    const sizes = center.map((column) => column.getSize())
    const offsets = [0]
    for (const width of sizes) offsets.push(offsets[offsets.length - 1]! + width)
    const ids = [NAME_COLUMN, UNIT_COLUMN, ...streams]
    return {
      ids,
      indexOf: new Map(ids.map((id, index) => [id, index])),
      nameSize,
      unitSize,
      frozenSize: nameSize + unitSize,
      streams,
      sizes,
      offsets,
      totalSize: offsets[offsets.length - 1]!,
    }
  }, [center, nameSize, unitSize])
}
