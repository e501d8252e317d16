import type { GridPlace, GridRange } from '@/hooks/grid-model'
import { NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import { type Edit, refuse, together } from '@/lib/book/edits/draft'
import { renameTag, setManyFields } from '@/lib/book/edits/fields'
import { clearGivens, type GivenCell } from '@/lib/book/edits/givens'
import { setLink } from '@/lib/book/edits/links'
import { absenceId, linkId, newId, type StreamId } from '@/lib/book/ids'
import type { BookState } from '@/lib/book/state'
import { entryMeasure, readEntry, typedOf } from '@/lib/sheet/entry'
import { type DecimalSign, readNumber } from '@/lib/sheet/read-number'
import { type BookView, cellKey, measureOfRow, rowUnit } from './book-view'
import { quantityOf, readRow, type StreamField } from './rows'

/** What stands typed in a value cell, read by its row; `as`: the decimal sign of a block that knows its own; `meter`: which reading. */
export function readTyped(
  view: BookView,
  place: GridPlace,
  text: string,
  as?: DecimalSign,
  meter?: string,
): GivenCell | null {
  const ref = readRow(place.row)
  if (ref?.kind !== 'value' || place.column === NAME_COLUMN || place.column === UNIT_COLUMN) return null
  // A value that stands here under the other name of its quantity stays there: massFlow is flow in a mass book.
  const list = view.givensAt.get(cellKey(place.column, ref)) ?? []
  const standing = meter === undefined ? list[0] : list.find(({ instrument }) => instrument === meter)
  const measure = measureOfRow(view, ref)
  if (ref.quantity === 'measure' && !measure) return null
  const plain = ref.quantity === 'measure' ? null : quantityOf(ref.quantity, view.book.basis)
  const quantity = standing?.quantity ?? measure?.quantity ?? plain
  if (quantity === null) return null
  const entry = readEntry(text, {
    measure: entryMeasure(quantity, view.book.basis),
    unit: rowUnit(view, ref).symbol,
    decimal: as ?? view.decimal,
  })
  const instrument = meter ?? standing?.instrument ?? 'main'
  const { componentId, measureId } = ref
  return {
    caseId: view.caseId,
    streamId: place.column,
    quantity,
    componentId,
    measureId,
    instrument,
    typed: typedOf(entry),
  }
}

/** A value that would stand where its component cannot be. */
export const isAbsentThere = (state: BookState, cell: GivenCell): boolean =>
  cell.componentId !== null &&
  cell.typed !== null &&
  cell.typed.value !== 0 &&
  state.absence.has(absenceId(cell.streamId, cell.componentId))

/** One edit of a head or note cell of a stream. An empty end of a stream clears its connection. */
export function setStreamField(
  state: BookState,
  streamId: StreamId,
  field: StreamField,
  text: string,
  decimal: DecimalSign,
): Edit {
  const typed = text.trim()
  if (field === 'tag') return renameTag(state, 'stream', streamId, typed, newId)
  if (field === 'from' || field === 'to') return setEnd(state, streamId, field, typed)
  if (field === 'density') {
    const number = typed === '' ? null : readNumber(typed.replace(/\s*kg\/m(3|³|\^3)$/, ''), decimal)
    if (number && (!number.ok || number.rest !== ''))
      return refuse(number.ok ? `“${number.rest}” is not understood here: density is in kg/m³.` : number.reason)
    const value = number?.ok ? number.value : null
    if (value !== null && value <= 0) return refuse('A density is more than 0 kg/m³.')
    return setManyFields(state, [{ kind: 'stream', id: streamId, fields: { density: value } }], newId)
  }
  if (field === 'name') return setManyFields(state, [{ kind: 'stream', id: streamId, fields: { name: typed } }], newId)
  const fields = { [field]: typed === '' ? null : typed }
  return setManyFields(state, [{ kind: 'stream', id: streamId, fields }], newId)
}

function setEnd(state: BookState, streamId: StreamId, field: 'from' | 'to', tag: string): Edit {
  const direction = field === 'from' ? 'out' : 'in'
  const link = state.link.get(linkId(streamId, direction))
  if (tag === '') {
    if (!link) return together(state, newId, 'No change', [])
    return setLink(state, { streamId, unitId: link.unitId, direction: null }, newId)
  }
  const units = [...state.unit.values()]
  const unit =
    units.find((one) => one.tag.trim() === tag) ??
    units.find((one) => one.tag.trim().toLowerCase() === tag.toLowerCase())
  if (!unit) return refuse(`There is no unit ${tag}. Add it under Connections, or choose one of the list.`)
  return setLink(state, { streamId, unitId: unit.id, direction, move: true }, newId)
}

/** Delete: givens go, names and notes are emptied, ends are cleared; tags stay. One change. */
export function clearRange(view: BookView, range: GridRange): Edit {
  const places: GivenCell[] = []
  const steps: ((state: BookState) => Edit)[] = []
  for (const row of range.rows) {
    const ref = readRow(row)
    if (!ref || ref.kind === 'section') continue
    for (const column of range.columns) {
      if (column === NAME_COLUMN || column === UNIT_COLUMN) continue
      if (ref.kind === 'field') {
        if (ref.field !== 'tag') steps.push((state) => setStreamField(state, column, ref.field, '', view.decimal))
        continue
      }
      for (const given of view.givensAt.get(cellKey(column, ref)) ?? []) places.push({ ...given, typed: null })
    }
  }
  if (steps.length === 0) return clearGivens(view.state, places, newId)
  if (places.length > 0) steps.unshift((state) => clearGivens(state, places, newId))
  return together(view.state, newId, 'Clear cells', steps)
}
