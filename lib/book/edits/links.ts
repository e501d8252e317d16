import type { FieldUpdate } from '../change'
import { linkId, type StreamId, type UnitId } from '../ids'
import type { BookRecord, RecordOf } from '../kinds'
import type { BookState } from '../state'
import { counted, type Edit, edit, type MakeId, refuse, together, updateOf } from './draft'

export type LinkCell = { streamId: StreamId; unitId: UnitId; direction: 'in' | 'out' | null }

/** The connection of this stream's end to another unit, that stands in the way of `cell`. */
export function linkInTheWay(state: BookState, cell: LinkCell): RecordOf<'link'> | undefined {
  if (cell.direction === null) return undefined
  const link = state.link.get(linkId(cell.streamId, cell.direction))
  return link && link.unitId !== cell.unitId ? link : undefined
}

/**
 * One cell of the connections: into the unit, out of it, or neither. A stream has one source and one sink at most: where
 * that end is taken by another unit, refused, or moved here with `move`.
 */
export function setLink(state: BookState, cell: LinkCell & { move?: boolean }, makeId: MakeId): Edit {
  const { streamId, unitId, direction, move = false } = cell
  const stream = state.stream.get(streamId)
  const unit = state.unit.get(unitId)
  if (!stream || !unit) return refuse(`This ${stream ? 'unit' : 'stream'} is no longer in the book.`)
  const inTheWay = linkInTheWay(state, cell)
  if (inTheWay && !move) return refuse(takenText(state, stream.tag, unit.tag, inTheWay))
  const create: BookRecord[] = []
  const update: (FieldUpdate | undefined)[] = []
  const remove: BookRecord[] = []
  for (const end of ['in', 'out'] as const) {
    const link = state.link.get(linkId(streamId, end))
    if (link && link.unitId === unitId && end !== direction) remove.push(link)
  }
  if (direction !== null) {
    const id = linkId(streamId, direction)
    const old = state.link.get(id)
    if (old) update.push(updateOf(old, { unitId }))
    else create.push({ kind: 'link', id, streamId, direction, unitId })
  }
  const label =
    direction === null
      ? `Stream ${stream.tag}: not connected to ${unit.tag}`
      : `Stream ${stream.tag}: ${direction === 'in' ? 'into' : 'out of'} ${unit.tag}`
  return edit(state, makeId, label, { create, update, remove })
}

/** Many cells in one change, in their order: cells that clear an end come first, so that a pasted block may move it. */
export function setLinks(state: BookState, cells: readonly LinkCell[], makeId: MakeId, label?: string): Edit {
  const cleared = cells.filter(({ direction }) => direction === null)
  const set = cells.filter(({ direction }) => direction !== null)
  const steps = [...cleared, ...set].map((cell) => (current: BookState) => setLink(current, cell, makeId))
  return together(state, makeId, label ?? `${counted(cells.length, 'connection')} set`, steps)
}

function takenText(state: BookState, stream: string, unit: string, { unitId, direction }: RecordOf<'link'>): string {
  const other = state.unit.get(unitId)?.tag ?? 'another unit'
  return direction === 'in'
    ? `Stream ${stream} already ends at ${other}: clear that connection first, or move its end to ${unit}.`
    : `Stream ${stream} already comes out of ${other}: clear that connection first, or move its start to ${unit}.`
}
