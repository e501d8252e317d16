import type { GridPlace } from '@/hooks/grid-model'
import type { BookView } from './book-view'
import { isDoubtful, type Reading, readCell } from './cell-reading'
import { readRow, type SectionKey } from './rows'
import { tableRows } from './table-cells'

export type Sought = 'unknown' | 'atOdds' | 'flagged'

/** Keys that go to the next such cell; with Shift to the one before. */
export const seekKeys: Readonly<Record<string, Sought>> = { F4: 'unknown', F8: 'atOdds', F9: 'flagged' }

export const noneWords: Record<Sought, string> = {
  unknown: 'No cell is still unknown.',
  atOdds: 'No cell is at odds.',
  flagged: 'No cell is flagged.',
}

const matches: Record<Sought, (reading: Reading) => boolean> = {
  unknown: ({ state }) => state === 'unknown',
  atOdds: ({ state }) => state === 'atOdds',
  flagged: ({ state, flags }) => state === 'wrong' || isDoubtful(flags),
}

/**
 * The next such cell, stream by stream and downwards in each, round the end to the beginning; null where there is none.
 * Closed sections of the book's own basis are looked through too; the other basis only where it is open, since it says the same.
 */
export function seekCell(
  view: BookView,
  open: ReadonlySet<SectionKey>,
  from: GridPlace,
  sought: Sought,
  back: boolean,
): GridPlace | null {
  const all = tableRows(view, new Set<SectionKey>([...open, 'fraction', 'componentFlow', 'measures']))
  const places = all.flatMap(({ id }) => {
    const ref = readRow(id)
    return ref?.kind === 'value' ? [{ id, ref, at: all.findIndex((row) => row.id === id) }] : []
  })
  const count = view.streams.length * places.length
  if (count === 0) return null
  const step = back ? -1 : 1
  let at = startOf(view, all, places, from, back)
  for (let seen = 0; seen < count; seen++, at = (at + step + count) % count) {
    const stream = view.streams[Math.floor(at / places.length)]
    const place = places[at % places.length]
    if (stream && place && matches[sought](readCell(view, stream.id, place.ref)))
      return { row: place.id, column: stream.id }
  }
  return null
}

/** The first place to look at, numbered stream by stream: beside the cursor, which may stand in a head. */
function startOf(
  view: BookView,
  all: readonly { id: string }[],
  places: readonly { id: string; at: number }[],
  from: GridPlace,
  back: boolean,
): number {
  const count = view.streams.length * places.length
  const stream = view.streams.findIndex(({ id }) => id === from.column)
  if (stream < 0) return back ? count - 1 : 0
  const row = all.findIndex(({ id }) => id === from.row)
  const below = places.findIndex(({ at }) => (back ? at >= row : at > row))
  const within = below < 0 ? places.length : below
  return (stream * places.length + within - (back ? 1 : 0) + count) % count
}
