import type { GridPlace } from '@/hooks/grid-model'
import type { SolvedCase } from '@/hooks/solver-handle'
import { measureKey } from '@/lib/balance/measure/measure-name'
import { type BookUnits, bookUnits, parseFractionUnit } from '@/lib/balance/measure/units-of-measure'
import type { Diagnostic, Place } from '@/lib/balance/solution'
import type { CaseId, MeasureId, StreamId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { type Measure, measureName, measureTitle } from '@/lib/book/measures'
import { type BookState, bookOf, inOrder } from '@/lib/book/state'
import { unitKindOf } from '@/lib/book/units'
import type { NumberStyle } from '@/lib/sheet/format'
import type { DecimalSign } from '@/lib/sheet/read-number'
import { type RowPlace, type RowQuantity, rowIdOf, rowQuantityOf, rowTitle } from './rows'

type Given = RecordOf<'given'>

/** Significant digits of what follows, by kind of row; null: as many as the size asks for. */
export type Digits = { flow: number | null; fraction: number | null }
const digitsBySize: Digits = { flow: null, fraction: null }

/** A book with its newest answer, indexed for the screen. Built anew when either changes; linear in the records. */
export type BookView = {
  state: BookState
  book: RecordOf<'book'>
  caseId: CaseId
  mayEdit: boolean
  decimal: DecimalSign
  digits: Digits
  units: BookUnits | undefined
  streams: readonly RecordOf<'stream'>[]
  components: readonly RecordOf<'component'>[]
  plant: readonly RecordOf<'unit'>[]
  /** Rows that people added, in order. */
  measures: readonly Measure[]
  /** The row of a measure that the solver names by tags. */
  measureAt: ReadonlyMap<string, MeasureId>
  solved: SolvedCase | null
  /** Givens of the case by the cell they stand in: those in use first, and of these the main instrument. */
  givensAt: ReadonlyMap<string, readonly Given[]>
  /** What the solver has to say about a stream or a unit, by record id. */
  streamTroubles: ReadonlyMap<StreamId, readonly Diagnostic[]>
  unitTroubles: ReadonlyMap<string, readonly Diagnostic[]>
  /** Records that the solver could not take, by id. */
  leftOut: ReadonlyMap<string, string>
}

export const cellKey = (stream: StreamId, { quantity, componentId, measureId }: RowPlace): string =>
  `${stream}|${quantity}|${componentId ?? measureId ?? ''}`

/** The solver shows the first of these, so the table does too. */
const displayRank = ({ use, instrument }: Given): string =>
  `${use === 'given' ? 0 : 1}${instrument === 'main' ? '' : `~${instrument}`}`

export function bookView(
  state: BookState,
  caseId: CaseId,
  solved: SolvedCase | null,
  mayEdit: boolean,
  decimal: DecimalSign,
  digits: Digits = digitsBySize,
): BookView {
  const book = bookOf(state)
  const givensAt = new Map<string, Given[]>()
  for (const given of state.given.values()) {
    if (given.caseId !== caseId) continue
    const key = cellKey(given.streamId, rowOfGiven(given, book.basis))
    const list = givensAt.get(key)
    if (list) list.push(given)
    else givensAt.set(key, [given])
  }
  for (const list of givensAt.values())
    if (list.length > 1) list.sort((a, b) => (displayRank(a) < displayRank(b) ? -1 : 1))
  const measures = inOrder(state.measure)
  const measureAt = new Map<string, MeasureId>()
  for (const measure of measures) {
    const name = measureName(state, measure)
    if (typeof name !== 'string') measureAt.set(measureKey(name), measure.id)
  }
  const streams = inOrder(state.stream)
  const plant = inOrder(state.unit)
  const byTag = (records: readonly { id: string; tag: string }[]) =>
    new Map(records.map(({ id, tag }) => [tag.trim(), id]))
  const [streamByTag, unitByTag] = [byTag(streams), byTag(plant)]
  const streamTroubles = new Map<StreamId, Diagnostic[]>()
  const unitTroubles = new Map<string, Diagnostic[]>()
  const put = (map: Map<string, Diagnostic[]>, id: string | undefined, diagnostic: Diagnostic) => {
    if (id === undefined) return
    const list = map.get(id)
    if (list) list.push(diagnostic)
    else map.set(id, [diagnostic])
  }
  for (const diagnostic of solved?.solution.diagnostics ?? []) {
    if (diagnostic.unit !== undefined) put(unitTroubles, unitByTag.get(diagnostic.unit), diagnostic)
    else if (diagnostic.stream !== undefined) put(streamTroubles, streamByTag.get(diagnostic.stream), diagnostic)
  }
  return {
    state,
    book,
    caseId,
    mayEdit,
    decimal,
    digits,
    units: bookUnits(book.basis, book.flowUnit),
    streams,
    components: inOrder(state.component),
    plant,
    measures,
    measureAt,
    solved,
    givensAt,
    streamTroubles,
    unitTroubles,
    leftOut: new Map(solved?.leftOut.map(({ id, what }) => [id, what])),
  }
}

/** The row that a given stands in. */
export const rowOfGiven = (
  { quantity, componentId, measureId = null }: Pick<Given, 'quantity' | 'componentId' | 'measureId'>,
  basis: RecordOf<'book'>['basis'],
): RowPlace => ({ quantity: rowQuantityOf(quantity, basis), componentId, measureId })

/** The row of a place that the solver names by tags; null where the book no longer has it. */
export function rowOfPlace(view: BookView, place: Place): RowPlace | null {
  const quantity = rowQuantityOf(place.quantity, view.book.basis)
  if (quantity === 'measure') {
    const measureId = view.measureAt.get(measureKey(place))
    return measureId === undefined ? null : { quantity, componentId: null, measureId }
  }
  if (place.component === undefined) return { quantity, componentId: null, measureId: null }
  const component = view.components.find(({ tag }) => tag.trim() === place.component)
  return component ? { quantity, componentId: component.id, measureId: null } : null
}

/** The stream that the solver names by this tag; null where the book no longer has it. */
export const streamIdOf = (view: BookView, tag: string | undefined): StreamId | null =>
  view.streams.find((stream) => stream.tag.trim() === tag)?.id ?? null

/** Where in the stream table a place of the solver stands; null where the book no longer has it. */
export function gridPlaceOf(view: BookView, place: Place): GridPlace | null {
  const row = rowOfPlace(view, place)
  const column = streamIdOf(view, place.stream)
  return row && column !== null ? { row: rowIdOf(row), column } : null
}

export const isSameRow = (a: RowPlace, b: RowPlace): boolean =>
  a.quantity === b.quantity && a.componentId === b.componentId && a.measureId === b.measureId

export const measureOfRow = (view: BookView, { measureId }: RowPlace): Measure | undefined =>
  measureId === null ? undefined : view.state.measure.get(measureId)

/** What the values of a row are: "Mass fraction", "Volume flow", or what the row of a measure is called. */
export function titleOfRow(view: BookView, row: RowPlace): string {
  const measure = measureOfRow(view, row)
  if (measure) return measureTitle(view.state, measure)
  return rowTitle(row.quantity, view.book.basis)
}

/** The unit that a row shows its values in, as written for people and as the solver's units know it. */
export function rowUnit(view: BookView, row: RowPlace): { shown: string; symbol: string } {
  const { basis, flowUnit } = view.book
  const ownIsMass = basis === 'mass'
  switch (row.quantity) {
    case 'flow':
    case 'componentFlow':
      return { shown: flowUnit, symbol: flowUnit }
    case 'fraction':
      return { shown: ownIsMass ? 'wt %' : 'mol %', symbol: '%' }
    case 'otherFraction':
      return { shown: ownIsMass ? 'mol %' : 'wt %', symbol: '%' }
    case 'volumeFlow': {
      const symbol = view.units?.volume.symbol ?? ''
      return { shown: symbol.replace('m3', 'm³'), symbol }
    }
    case 'measure': {
      const measure = measureOfRow(view, row)
      if (!measure) return { shown: '', symbol: '1' }
      const ofMass = unitKindOf(measure.quantity, basis) === 'massFraction'
      const words: Record<string, string> = ofMass ? { 1: 'kg/kg', '%': 'wt %' } : { 1: 'mol/mol', '%': 'mol %' }
      return { shown: words[measure.unit] ?? measure.unit, symbol: measure.unit }
    }
    default: {
      const symbol = (ownIsMass ? view.units?.mole : view.units?.mass)?.symbol ?? ''
      return { shown: symbol, symbol }
    }
  }
}

export const isFraction = (quantity: RowQuantity): boolean => quantity === 'fraction' || quantity === 'otherFraction'

/** How many of the row's unit make the solver's: 100 for %, 1 for flows. */
export const rowScale = (view: BookView, row: RowPlace): number =>
  isFraction(row.quantity) || row.quantity === 'measure'
    ? 1 / (parseFractionUnit(rowUnit(view, row).symbol)?.factor ?? 1)
    : 1

export const rowStyle = (view: BookView, row: RowPlace): NumberStyle =>
  isFraction(row.quantity) || measureOfRow(view, row)?.unit === '%' ? 'percent' : 'flow'
