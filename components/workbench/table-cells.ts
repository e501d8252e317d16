import type { CellTone, CellView, GridPlace, GridRow } from '@/hooks/grid-model'
import { NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import { CellState } from '@/lib/balance/solution'
import { linkId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { measureKinds } from '@/lib/book/measures'
import { type BookView, measureOfRow, rowUnit, titleOfRow } from './book-view'
import {
  flagWords,
  isDoubtful,
  keptWords,
  type ReadState,
  readCell,
  shownNumber,
  stateWords,
  typedNumber,
} from './cell-reading'
import { fractionChoice } from './odds/fraction-choice'
import {
  fieldTitle,
  measureRow,
  type RowPlace,
  type RowQuantity,
  type RowRef,
  readRow,
  rowTitle,
  type SectionKey,
  type StreamField,
  sectionRow,
  valueRow,
} from './rows'

/** The rows of the stream table, in the order in which reports print them. */
export function tableRows(view: BookView, open: ReadonlySet<SectionKey>): GridRow[] {
  const rows: GridRow[] = [
    { id: 'tag', size: 30 },
    { id: 'name', size: 43 },
    { id: 'from', size: 23 },
    { id: 'to', size: 23 },
    { id: valueRow('flow'), size: 32 },
  ]
  const section = (key: SectionKey, under: () => GridRow[]) => {
    rows.push({ id: sectionRow(key), size: 24, section: { open: open.has(key) } })
    if (open.has(key)) rows.push(...under())
  }
  const each = (quantity: RowQuantity) => () =>
    view.components.map(({ id }) => ({ id: valueRow(quantity, id), size: 27 }))
  if (view.components.length > 0) {
    section('fraction', each('fraction'))
    section('componentFlow', each('componentFlow'))
    if (hasOtherBasis(view)) {
      section('otherFraction', each('otherFraction'))
      section('otherComponentFlow', () => [{ id: valueRow('otherFlow'), size: 27 }, ...each('otherComponentFlow')()])
    }
  }
  if (view.measures.length > 0)
    section('measures', () => view.measures.map(({ id }) => ({ id: measureRow(id), size: 27 })))
  section('carried', () =>
    ['phase', 'density', valueRow('volumeFlow'), 'temperature', 'pressure'].map((id) => ({ id, size: 25 })),
  )
  return rows
}

/** The other basis is worth rows where any component has a molar mass. */
export const hasOtherBasis = (view: BookView): boolean =>
  view.components.some(({ molarMass, formula }) => molarMass !== null || (formula ?? '').trim() !== '') ||
  (view.solved?.solution.states.some((state, slot) => isOther(view, slot) && state !== CellState.absent) ?? false)

function isOther(view: BookView, slot: number): boolean {
  const n = view.solved?.solution.nComponents ?? 0
  return slot % (2 + 4 * n) > 2 * n
}

export function tableCell(view: BookView, place: GridPlace): CellView {
  const ref = readRow(place.row)
  if (!ref) return { text: '', label: '', tone: 'plain' }
  if (place.column === NAME_COLUMN) return headCell(view, ref)
  if (place.column === UNIT_COLUMN) return unitCell(view, ref)
  const stream = view.state.stream.get(place.column)
  if (!stream) return { text: '', label: '', tone: 'plain' }
  if (ref.kind === 'field') return fieldCell(view, ref.field, stream)
  if (ref.kind === 'section') return { text: '', label: '', tone: 'plain' }
  return valueCell(view, stream, ref)
}

function headCell(view: BookView, ref: RowRef): CellView {
  if (ref.kind === 'field') {
    const text = fieldTitle[ref.field]
    return {
      text,
      label: text,
      tone:
        ref.field === 'tag'
          ? 'tag'
          : ref.field === 'name'
            ? 'end'
            : ref.field === 'from' || ref.field === 'to'
              ? 'end'
              : 'label',
    }
  }
  if (ref.kind === 'section') {
    const text = sectionTitle(view, ref.section)
    return { text, label: `${text}, section`, tone: 'section' }
  }
  const { quantity, componentId } = ref
  const measure = measureOfRow(view, ref)
  if (measure) {
    const text = titleOfRow(view, ref)
    return { text, label: `${text}, ${measureKinds[measure.quantity].toLowerCase()}`, tone: 'label' }
  }
  if (componentId === null) {
    const text = rowTitle(quantity, view.book.basis)
    return { text, label: text, tone: 'total', bold: quantity === 'flow' }
  }
  const component = view.state.component.get(componentId)
  const text = component?.name || component?.tag || ''
  const aside = component?.name && component.name !== component.tag ? component.tag : undefined
  const label = `${text}${aside ? ` (${aside})` : ''}, ${rowTitle(quantity, view.book.basis).toLowerCase()}`
  return { text, label, tone: 'label', ...(aside === undefined ? {} : { aside }) }
}

function sectionTitle(view: BookView, section: SectionKey): string {
  if (section === 'carried') return 'Carried notes'
  return section === 'measures' ? 'Further measures' : rowTitle(section, view.book.basis)
}

function unitCell(view: BookView, ref: RowRef): CellView {
  const shown =
    ref.kind === 'value' ? rowUnit(view, ref).shown : ref.kind === 'field' && ref.field === 'density' ? 'kg/m³' : ''
  const isEnd = ref.kind === 'field' && (ref.field === 'from' || ref.field === 'to')
  return { text: shown, label: shown === '' ? 'No unit' : `Unit: ${shown}`, tone: isEnd ? 'end' : 'kind' }
}

function fieldCell(view: BookView, field: StreamField, stream: RecordOf<'stream'>): CellView {
  const where = `${fieldTitle[field]}, stream ${stream.tag}`
  if (field === 'from' || field === 'to') {
    const link = view.state.link.get(linkId(stream.id, field === 'from' ? 'out' : 'in'))
    const unit = link && view.state.unit.get(link.unitId)?.tag
    return {
      text: unit ?? '',
      label: `${where}: ${unit ?? (field === 'from' ? 'comes from outside' : 'leaves the process')}`,
      tone: 'end',
    }
  }
  if (field === 'tag') {
    const troubles = (view.streamTroubles.get(stream.id) ?? []).filter(({ severity }) => severity !== 'note')
    const said = troubles.map(({ text }) => text).join(' ')
    const choice = fractionChoice(view, stream)
    return {
      text: stream.tag,
      label: `Stream ${stream.tag}${stream.name ? `, ${stream.name}` : ''}${choice ? `; ${choice.words}` : ''}`,
      ...(choice ? { aside: choice.mark } : {}),
      tone: 'tag',
      ...(said === '' ? {} : { mark: 'broken' as const, description: said }),
    }
  }
  const value = stream[field]
  const text = value === null ? '' : String(value)
  return { text, label: `${where}: ${text === '' ? 'empty' : text}`, tone: field === 'name' ? 'name' : 'plain' }
}

const toneOf: Record<ReadState, CellTone> = {
  given: 'given',
  solvable: 'solvable',
  unknown: 'unknown',
  atOdds: 'atOdds',
  absent: 'absent',
  wrong: 'plain',
  missing: 'absent',
}

function valueCell(view: BookView, stream: RecordOf<'stream'>, row: RowPlace): CellView {
  const { quantity, componentId } = row
  const reading = readCell(view, stream.id, row)
  const { shown } = rowUnit(view, row)
  const component = componentId === null ? null : view.state.component.get(componentId)
  const title = titleOfRow(view, row)
  const what = component ? `${title} of ${component.name || component.tag}` : title
  const state = stateWords[reading.state]
  const where = `${what}, stream ${stream.tag}`
  if (reading.state === 'wrong') {
    const typed = reading.given?.text ?? ''
    const cell = { text: typed, tone: 'plain' as const, mark: 'wrong' as const, description: reading.reason ?? '' }
    return { ...cell, label: `${where}: “${typed}”, ${state}` }
  }
  const number = shownNumber(view, row, reading)
  const words = flagWords(reading.flags)
  const text = number !== '' ? number : reading.state === 'absent' ? '–' : reading.state === 'missing' ? '' : '·'
  const typed = reading.given && reading.kept ? typedNumber(view, row, reading.given) : null
  // A value that stands but is not used is told after the one that holds.
  const aside = reading.kept
    ? `; typed ${typed === null ? `“${reading.given?.text}”` : `${typed} ${shown}`}, ${keptWords[reading.kept]}`
    : ''
  const keptHint = aside === '' ? '' : `Not used: ${aside.slice(2)}.`
  const count = reading.others.length + (reading.given ? 1 : 0)
  const several = count > 1 ? `, ${count} readings` : ''
  const description = [reading.reason ?? '', keptHint, ...words].filter(Boolean).join(' ')
  return {
    text,
    label: `${number === '' ? `${where}: ${state}` : `${where}: ${number} ${shown}, ${state}`}${aside}${several}`,
    ...(count > 1 ? { readings: count } : {}),
    tone: toneOf[reading.state],
    ...(reading.kept === null ? {} : { kept: reading.kept }),
    bold: quantity === 'flow',
    ...(isDoubtful(reading.flags) || (reading.state === 'absent' && reading.given) ? { mark: 'flag' as const } : {}),
    ...(description === '' ? {} : { description }),
  }
}
