import {
  type CellView,
  type GridPlace,
  type GridRow,
  type GridSource,
  NAME_COLUMN,
  UNIT_COLUMN,
} from '@/hooks/grid-model'
import { moveAfter, renameTag, setFields } from '@/lib/book/edits/fields'
import { type LinkCell, linkInTheWay, setLink, setLinks } from '@/lib/book/edits/links'
import { linkId, newId } from '@/lib/book/ids'
import { type RecordOf, unitKinds } from '@/lib/book/kinds'
import type { BookState } from '@/lib/book/state'
import { toHtmlTable, toTsv } from '@/lib/sheet/clipboard'
import { placeBlock } from '@/lib/sheet/paste'
import type { Selection } from '@/lib/sheet/selection'
import type { BookView } from './book-view'
import type { Desk } from './desk'
import { readBlock } from './table-paste'
import { neighbour } from './table-source'

export type Direction = 'in' | 'out'

export const linksRows = (view: BookView): GridRow[] => view.plant.map(({ id }) => ({ id, size: 29 }))

/** How a stream stands to a unit: into it, out of it, or not at all. */
export function directionAt(state: BookState, unitId: string, streamId: string): Direction | null {
  if (state.link.get(linkId(streamId, 'in'))?.unitId === unitId) return 'in'
  if (state.link.get(linkId(streamId, 'out'))?.unitId === unitId) return 'out'
  return null
}

const shortly: Readonly<Record<string, string>> = {
  noOutlet: 'no outlet',
  noInlet: 'no inlet',
  noUnit: 'not connected',
  mixerManyOutlets: 'more than one outlet',
}

/** The connections: units down, streams across, in the same columns as the stream table above them. */
export function linksSource(view: BookView, rows: readonly GridRow[], desk: Desk): GridSource {
  const { state } = view
  const set = (cell: LinkCell) => setLinkOrOffer(view, desk, cell)
  const isLink = (place: GridPlace) => place.column !== NAME_COLUMN && place.column !== UNIT_COLUMN
  return {
    label: 'Connections: units by streams',
    rows,
    frozen: 0,
    view: (place) => linkCell(view, place),
    mayEdit: (place) => view.mayEdit && !isLink(place),
    isReadOnly: () => !view.mayEdit,
    editText: (place) => {
      const unit = state.unit.get(place.row)
      return (place.column === UNIT_COLUMN ? unit?.unitKind : unit?.tag) ?? ''
    },
    suggestions: ({ column }) => (column === UNIT_COLUMN ? unitKinds : []),
    commit: (place, text) => {
      const typed = text.trim()
      if (place.column === NAME_COLUMN) return desk.run(renameTag(state, 'unit', place.row, typed, newId))
      const matches = unitKinds.filter((kind) => typed !== '' && kind.startsWith(typed.toLowerCase()))
      const [kind] = matches
      if (!kind || matches.length > 1) return `“${typed}” is no kind of unit: ${unitKinds.join(', ')}.`
      return desk.run(setFields(state, 'unit', place.row, { unitKind: kind }, newId))
    },
    clear: (range) => {
      if (!view.mayEdit) return
      const cells = range.rows.flatMap((unitId) =>
        range.columns.flatMap((streamId) =>
          directionAt(state, unitId, streamId) === null ? [] : [{ unitId, streamId, direction: null }],
        ),
      )
      if (cells.length > 0) desk.tryRun(setLinks(state, cells, newId, 'Clear connections'))
    },
    activate: (place) => {
      if (!isLink(place)) return false
      if (view.mayEdit) cycle(view, desk, { unitId: place.row, streamId: place.column, direction: null })
      return true
    },
    letter: (place, key) => {
      if (!isLink(place)) return false
      const direction = ({ i: 'in', o: 'out' } as const)[key.toLowerCase() as 'i' | 'o']
      if (direction && view.mayEdit) set({ unitId: place.row, streamId: place.column, direction })
      return true
    },
    menu: (place, at) => desk.openMenu({ pane: 'links', place, at }),
    shift: (place, by) => {
      if (!view.mayEdit) return
      const isRow = by.rows !== 0
      const after = isRow
        ? neighbour(view.plant, place.row, by.rows)
        : neighbour(view.streams, place.column, by.columns)
      if (after === undefined) return
      desk.tryRun(moveAfter(state, isRow ? 'unit' : 'stream', isRow ? place.row : place.column, after, newId))
    },
    copy: (range) => {
      const block = range.rows.map((row) => range.columns.map((column) => linkCell(view, { row, column }).text))
      return { text: toTsv(block), html: toHtmlTable(block, view.decimal) }
    },
    paste: (range, data) => {
      if (!view.mayEdit) return desk.tell('You can read this book; your role does not edit it.')
      const anchor = { row: range.rows[0] ?? '', column: range.columns[0] ?? '' }
      const focus = { row: range.rows.at(-1) ?? '', column: range.columns.at(-1) ?? '' }
      const selection: Selection = { active: anchor, anchor, focus }
      const lines = {
        rows: rows.map(({ id }) => id),
        columns: [NAME_COLUMN, UNIT_COLUMN, ...view.streams.map(({ id }) => id)],
      }
      const placed = placeBlock(lines, selection, readBlock(data).rows)
      const cells: LinkCell[] = []
      for (const { row, column, text } of placed.cells) {
        const word = text.trim().toLowerCase()
        if (!isLink({ row, column })) continue
        if (word !== 'in' && word !== 'out' && word !== '')
          return desk.tell(`“${text}” is no connection: a cell takes in, out or nothing.`)
        cells.push({ unitId: row, streamId: column, direction: word === '' ? null : word })
      }
      desk.tryRun(setLinks(state, cells, newId))
    },
  }
}

function linkCell(view: BookView, { row, column }: GridPlace): CellView {
  const unit = view.state.unit.get(row)
  if (!unit) return { text: '', label: '', tone: 'plain' }
  if (column === NAME_COLUMN) return unitHead(view, unit)
  if (column === UNIT_COLUMN)
    return { text: unit.unitKind, label: `Kind of ${unit.tag}: ${unit.unitKind}`, tone: 'kind' }
  const stream = view.state.stream.get(column)
  const direction = directionAt(view.state, row, column)
  return {
    text: direction ?? '',
    label: `Stream ${stream?.tag}, unit ${unit.tag}: ${direction ?? 'not connected'}`,
    tone: direction ?? 'plain',
  }
}

function unitHead(view: BookView, unit: RecordOf<'unit'>): CellView {
  const troubles = (view.unitTroubles.get(unit.id) ?? []).filter(({ severity }) => severity !== 'note')
  const name = unit.name === unit.tag ? '' : unit.name
  const label = `Unit ${unit.tag}${name ? `, ${name}` : ''}`
  if (troubles.length === 0) return { text: unit.tag, label, tone: 'label', ...(name ? { aside: name } : {}) }
  const words = troubles.map(({ code }) => shortly[code]).filter((word) => word !== undefined)
  return {
    text: unit.tag,
    label: words.length > 0 ? `${label}: ${words.join(', ')}` : label,
    tone: 'label',
    mark: 'broken',
    aside: words.length > 0 ? words.join(', ') : name,
    description: troubles.map(({ text }) => text).join(' '),
  }
}

/** None, in, out, none: an end that is taken by another unit is passed over; both taken: asked. */
function cycle(view: BookView, desk: Desk, cell: LinkCell): void {
  const { state } = view
  const now = directionAt(state, cell.unitId, cell.streamId)
  if (now === 'out') return void desk.tryRun(setLink(state, { ...cell, direction: null }, newId))
  const order: Direction[] = now === 'in' ? ['out'] : ['in', 'out']
  const free = order.find((direction) => !linkInTheWay(state, { ...cell, direction }))
  if (free) return void desk.tryRun(setLink(state, { ...cell, direction: free }, newId))
  if (now === 'in') return void desk.tryRun(setLink(state, { ...cell, direction: null }, newId))
  offerMove(view, desk, cell, ['in', 'out'])
}

function setLinkOrOffer(view: BookView, desk: Desk, cell: LinkCell): void {
  if (linkInTheWay(view.state, cell) && cell.direction) offerMove(view, desk, cell, [cell.direction])
  else desk.tryRun(setLink(view.state, cell, newId))
}

function offerMove(view: BookView, desk: Desk, cell: LinkCell, directions: readonly Direction[]): void {
  const { state } = view
  const stream = state.stream.get(cell.streamId)?.tag
  const unit = state.unit.get(cell.unitId)?.tag
  const taken = (direction: Direction) => state.unit.get(linkInTheWay(state, { ...cell, direction })?.unitId ?? '')?.tag
  const said = directions.map((direction) =>
    direction === 'in' ? `already enters ${taken('in')}` : `already comes out of ${taken('out')}`,
  )
  desk.offer({
    pane: 'links',
    place: { row: cell.unitId, column: cell.streamId },
    text: `Stream ${stream} ${said.join(' and ')}: a stream has one source and one sink.`,
    ways: directions.map((direction) => ({
      label: direction === 'in' ? `Let it enter ${unit} instead` : `Let it come out of ${unit} instead`,
      act: () => desk.tryRun(setLink(state, { ...cell, direction, move: true }, newId)),
    })),
  })
}
