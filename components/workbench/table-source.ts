import { ASKED, type GridPlace, type GridRow, type GridSource, NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import { together } from '@/lib/book/edits/draft'
import { moveAfter, setFields } from '@/lib/book/edits/fields'
import { setGivens } from '@/lib/book/edits/givens'
import { updateMeasure } from '@/lib/book/edits/measures'
import { setPresence } from '@/lib/book/edits/presence'
import { newId } from '@/lib/book/ids'
import { unitKindOf, unitsFor } from '@/lib/book/units'
import type { Selection } from '@/lib/sheet/selection'
import { type BookView, cellKey, measureOfRow, rowUnit, titleOfRow } from './book-view'
import type { Desk } from './desk'
import { type RowRef, readRow, type SectionKey } from './rows'
import { tableCell } from './table-cells'
import { clearRange, isAbsentThere, readTyped, setStreamField } from './table-edits'
import { copyBlock, pasteBlock, readBlock } from './table-paste'

export type TableInput = {
  view: BookView
  rows: readonly GridRow[]
  desk: Desk
  toggle: (section: SectionKey) => void
}

/** The stream table as the grid wants it. */
export function tableSource({ view, rows, desk, toggle }: TableInput): GridSource {
  const { state } = view
  return {
    label: `Stream table of ${view.book.name}`,
    rows,
    frozen: 4,
    view: (place) => tableCell(view, place),
    mayEdit: (place) => view.mayEdit && isTypedInto(place),
    isReadOnly: (place) => !view.mayEdit || !isTypedInto(place),
    editText: (place) => editText(view, place),
    suggestions: (place) => suggestions(view, place),
    commit: (place, text) => commit(view, desk, place, text),
    clear: (range) => {
      if (view.mayEdit) desk.tryRun(clearRange(view, range))
    },
    activate: (place, how) => {
      const ref = readRow(place.row)
      if (ref?.kind !== 'section') return false
      // A press on the heading also brings the cursor there; only a plain press or a key opens it.
      if (how === 'click' && place.column !== NAME_COLUMN) return false
      toggle(ref.section)
      return true
    },
    menu: (place, at) => desk.openMenu({ pane: 'table', place, at }),
    shift: (place, by) => {
      if (!view.mayEdit) return
      const ref = readRow(place.row)
      if (by.columns !== 0 && state.stream.has(place.column)) {
        const after = neighbour(view.streams, place.column, by.columns)
        if (after !== undefined) desk.tryRun(moveAfter(state, 'stream', place.column, after, newId))
      } else if (by.rows !== 0 && ref?.kind === 'value' && ref.componentId !== null) {
        const after = neighbour(view.components, ref.componentId, by.rows)
        if (after !== undefined) desk.tryRun(moveAfter(state, 'component', ref.componentId, after, newId))
      }
    },
    copy: (range) => copyBlock(view, range),
    paste: (range, data) => {
      if (!view.mayEdit) return desk.tell('You can read this book; your role does not edit it.')
      const [row, column] = [range.rows[0], range.columns[0]]
      const [lastRow, lastColumn] = [range.rows.at(-1), range.columns.at(-1)]
      if (row === undefined || column === undefined || lastRow === undefined || lastColumn === undefined) return
      const anchor = { row, column }
      const selection: Selection = { active: anchor, anchor, focus: { row: lastRow, column: lastColumn } }
      const lines = {
        rows: rows.filter(({ section }) => !section).map(({ id }) => id),
        columns: [NAME_COLUMN, UNIT_COLUMN, ...view.streams.map(({ id }) => id)],
      }
      pasteBlock({ view, desk, lines, selection, block: readBlock(data) })
    },
  }
}

function isTypedInto(place: GridPlace): boolean {
  const ref = readRow(place.row)
  if (!ref || ref.kind === 'section') return false
  const isMeasure = ref.kind === 'value' && ref.measureId !== null
  if (place.column === UNIT_COLUMN) return isMeasure
  return place.column !== NAME_COLUMN || isMeasure || (ref.kind === 'value' && ref.componentId !== null)
}

function suggestions(view: BookView, { row, column }: GridPlace): readonly string[] {
  if (row === 'from' || row === 'to') return view.plant.map(({ tag }) => tag)
  const ref = readRow(row)
  const measure = ref?.kind === 'value' && column === UNIT_COLUMN ? measureOfRow(view, ref) : undefined
  return measure ? unitsFor(unitKindOf(measure.quantity, view.book.basis)) : []
}

function editText(view: BookView, place: GridPlace): string {
  const ref = readRow(place.row)
  if (ref?.kind !== 'value') return tableCell(view, place).text
  const measure = measureOfRow(view, ref)
  if (place.column === UNIT_COLUMN) return measure?.unit ?? ''
  if (place.column === NAME_COLUMN) return measure?.name ?? tableCell(view, place).text
  // What follows from the rest is not put into the editor: Enter twice must not turn it into a given.
  return view.givensAt.get(cellKey(place.column, ref))?.[0]?.text ?? ''
}

function commit(view: BookView, desk: Desk, place: GridPlace, text: string): string | typeof ASKED | null {
  const { state } = view
  const ref = readRow(place.row)
  if (!ref || ref.kind === 'section' || text === editText(view, place)) return null
  const measure = ref.kind === 'value' ? measureOfRow(view, ref) : undefined
  if (measure && place.column === NAME_COLUMN) return desk.run(updateMeasure(state, measure.id, { name: text }, newId))
  if (measure && place.column === UNIT_COLUMN)
    return desk.run(updateMeasure(state, measure.id, { unit: text.trim() || '1' }, newId))
  if (place.column === NAME_COLUMN) {
    if (ref.kind !== 'value' || ref.componentId === null) return null
    return desk.run(setFields(state, 'component', ref.componentId, { name: text.trim() }, newId))
  }
  if (ref.kind === 'field') return desk.run(setStreamField(state, place.column, ref.field, text, view.decimal))
  const cell = readTyped(view, place, text)
  if (!cell) return null
  const { componentId } = cell
  if (componentId === null || !isAbsentThere(state, cell))
    return desk.run(setGivens(state, [cell], newId, labelFor(view, place, text)))
  const component = state.component.get(componentId)
  desk.offer({
    pane: 'table',
    place,
    text: `${component?.name || component?.tag} cannot be in stream ${state.stream.get(cell.streamId)?.tag}.`,
    ways: [
      {
        label: `Let it be present and type ${text.trim()}`,
        act: () =>
          desk.tryRun(
            together(state, newId, labelFor(view, place, text), [
              (now) => setPresence(now, [cell.streamId], [componentId], 'present', newId),
              (now) => setGivens(now, [cell], newId),
            ]),
          ),
      },
    ],
  })
  return ASKED
}

/** "Sodium chloride in 101: 24 wt %", for the undo button and the history. */
function labelFor(view: BookView, place: GridPlace, text: string): string {
  const ref = readRow(place.row)
  const stream = view.state.stream.get(place.column)?.tag ?? ''
  if (ref?.kind !== 'value') return `Stream ${stream}`
  const what = whatOf(view, ref)
  const typed = text.trim()
  if (typed === '') return `${what} in ${stream}: cleared`
  return `${what} in ${stream}: ${/[a-z%]/i.test(typed) ? typed : `${typed} ${rowUnit(view, ref).shown}`}`
}

function whatOf(view: BookView, ref: Extract<RowRef, { kind: 'value' }>): string {
  const component = ref.componentId === null ? undefined : view.state.component.get(ref.componentId)
  return component ? component.name || component.tag : titleOfRow(view, ref)
}

/** The record to follow after moving by `step` in the list; undefined: there is no further. */
export function neighbour(list: readonly { id: string }[], id: string, step: number): string | null | undefined {
  const index = list.findIndex((one) => one.id === id)
  const to = index + step
  if (index < 0 || to < 0 || to >= list.length) return undefined
  return step > 0 ? (list[to]?.id ?? null) : (list[to - 1]?.id ?? null)
}
