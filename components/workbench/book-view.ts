import type { SolvedCase } from '@/hooks/solver-handle'
import { type BookUnits, bookUnits } from '@/lib/balance/measure/units-of-measure'
import type { Diagnostic } from '@/lib/balance/solution'
import type { CaseId, ComponentId, StreamId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { type BookState, bookOf, inOrder } from '@/lib/book/state'
import type { DecimalSign } from '@/lib/sheet/read-number'
import { type RowQuantity, rowQuantityOf } from './rows'

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
  solved: SolvedCase | null
  /** Givens of the case by the cell they stand in, the main instrument first. */
  givensAt: ReadonlyMap<string, readonly Given[]>
  /** What the solver has to say about a stream or a unit, by record id. */
  streamTroubles: ReadonlyMap<StreamId, readonly Diagnostic[]>
  unitTroubles: ReadonlyMap<string, readonly Diagnostic[]>
  /** Records that the solver could not take, by id. */
  leftOut: ReadonlyMap<string, string>
}

export const cellKey = (stream: StreamId, quantity: RowQuantity, component: ComponentId | null): string =>
  `${stream}|${quantity}|${component ?? ''}`

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
    const quantity = rowQuantityOf(given.quantity, book.basis)
    const key = cellKey(given.streamId, quantity, given.componentId)
    const list = givensAt.get(key)
    if (!list) givensAt.set(key, [given])
    else if (given.instrument === 'main') list.unshift(given)
    else list.push(given)
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
    solved,
    givensAt,
    streamTroubles,
    unitTroubles,
    leftOut: new Map(solved?.leftOut.map(({ id, what }) => [id, what])),
  }
}

/** The unit that a row shows its values in, as written for people and as the solver's units know it. */
export function rowUnit(view: BookView, quantity: RowQuantity): { shown: string; symbol: string } {
  const { basis, flowUnit } = view.book
  const ownIsMass = basis === 'mass'
  switch (quantity) {
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
    default: {
      const symbol = (ownIsMass ? view.units?.mole : view.units?.mass)?.symbol ?? ''
      return { shown: symbol, symbol }
    }
  }
}

export const isFraction = (quantity: RowQuantity): boolean => quantity === 'fraction' || quantity === 'otherFraction'
