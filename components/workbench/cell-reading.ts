import { CellFlag, CellState, slotOf } from '@/lib/balance/solution'
import { absenceId, type ComponentId, type StreamId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { bookUnitOf, convert } from '@/lib/book/units'

import { entryMeasure, readEntry } from '@/lib/sheet/entry'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, cellKey, isFraction, rowUnit } from './book-view'
import type { RowQuantity } from './rows'

export type ReadState = 'given' | 'solvable' | 'unknown' | 'atOdds' | 'absent' | 'wrong' | 'missing'

/** What one cell of the stream table holds, before it is put into words. */
export type Reading = {
  state: ReadState
  /** In the row's unit; null where there is no value. */
  value: number | null
  /** The given that stands here, if any, also one that is not used. */
  given: RecordOf<'given'> | null
  /** Why the given that stands here is not used: kept as a check, withdrawn, or its component is by difference. */
  kept: 'check' | 'withdrawn' | 'difference' | null
  /** Further readings of the same measure. */
  others: readonly RecordOf<'given'>[]
  flags: number
  slot: number | null
  /** Why there is no value, or why what was typed is not used. */
  reason: string | null
}

/** Half a unit in the last typed digit, and the value, in the row's unit. */
function inRow(
  view: BookView,
  quantity: RowQuantity,
  given: RecordOf<'given'>,
): { value: number; halfWidth: number | null } | null {
  if (given.value === null) return null
  const { basis, flowUnit } = view.book
  const from = given.unit ?? bookUnitOf(given.quantity, basis, flowUnit)
  const to = rowUnit(view, quantity).symbol
  if (from === to) return { value: given.value, halfWidth: given.halfWidth }
  const value = from === undefined ? undefined : convert(given.value, from, to)
  if (from === undefined || value === undefined) return null
  const halfWidth = given.halfWidth === null ? null : (convert(given.halfWidth, from, to) ?? null)
  return { value: Number(value.toPrecision(14)), halfWidth }
}

/** The cell of a stream: what is typed there comes first, then what the solver found. */
export function readCell(
  view: BookView,
  streamId: StreamId,
  quantity: RowQuantity,
  componentId: ComponentId | null,
): Reading {
  const { solved, state } = view
  const list = view.givensAt.get(cellKey(streamId, quantity, componentId)) ?? []
  const given = list[0] ?? null
  const others = list.slice(1)
  const kept = given && given.use !== 'given' ? given.use : null
  const nothing: Reading = { state: 'unknown', value: null, given, kept, others, flags: 0, slot: null, reason: null }
  if (componentId !== null && state.absence.has(absenceId(streamId, componentId)))
    return { ...nothing, state: 'absent', reason: given ? (view.leftOut.get(given.id) ?? null) : null }
  if (quantity === 'volumeFlow') return readVolume(view, streamId, nothing)
  const stream = solved?.streamIndex.get(streamId)
  const component = componentId === null ? 0 : solved?.componentIndex.get(componentId)
  const slot =
    solved && stream !== undefined && component !== undefined
      ? slotOf(solved.solution.nComponents, stream, quantity, component)
      : null
  const found = slot === null || !solved ? CellState.unknown : (solved.solution.states[slot] as CellState)
  const flags = slot === null || !solved ? 0 : (solved.solution.flags[slot] ?? 0)
  const raw = slot === null || !solved ? Number.NaN : (solved.solution.values[slot] ?? Number.NaN)
  const computed = Number.isNaN(raw) ? null : isFraction(quantity) ? raw * 100 : raw
  if (given && given.value === null)
    return { ...nothing, state: 'wrong', flags, slot, reason: reasonOf(view, quantity, given) }
  if (given && given.use === 'given') {
    const typed = inRow(view, quantity, given)
    if (!isTaken(found) && isByDifference(view, streamId, quantity, componentId)) {
      const here = found === CellState.solvable ? { state: 'solvable' as const, value: computed, flags } : {}
      return { ...nothing, ...here, kept: 'difference', slot }
    }
    const refused = view.leftOut.get(given.id)
    if (refused !== undefined && !isTaken(found))
      return { ...nothing, state: 'wrong', value: typed?.value ?? null, flags, slot, reason: refused }
    return {
      ...nothing,
      state: found === CellState.atOdds ? 'atOdds' : 'given',
      value: typed?.value ?? null,
      flags,
      slot,
    }
  }
  // An answer that is a moment old may still call a cleared cell given: it is unknown until the next one comes.
  if (found === CellState.solvable || (found === CellState.given && others.some(({ use }) => use === 'given')))
    return { ...nothing, state: 'solvable', value: computed, flags, slot }
  if (found === CellState.atOdds) return { ...nothing, state: 'atOdds', value: computed, flags, slot }
  if (found === CellState.absent && quantity.startsWith('other'))
    return { ...nothing, state: 'missing', slot, reason: 'A molar mass is missing' }
  return { ...nothing, state: 'unknown', slot }
}

/** A typed fraction that the person lets follow from the others. */
function isByDifference(
  view: BookView,
  streamId: StreamId,
  quantity: RowQuantity,
  componentId: string | null,
): boolean {
  const stream = view.state.stream.get(streamId)
  return isFraction(quantity) && stream?.fractions === 'difference' && stream.differenceComponentId === componentId
}

/** A volume flow: typed, or mass over density where both are known. It is no cell of the solver's arrays. */
function readVolume(view: BookView, streamId: StreamId, nothing: Reading): Reading {
  const { given } = nothing
  if (given && given.use === 'given') {
    const refused = given.value === null ? reasonOf(view, 'volumeFlow', given) : view.leftOut.get(given.id)
    if (refused !== undefined) return { ...nothing, state: 'wrong', reason: refused }
    return { ...nothing, state: 'given', value: inRow(view, 'volumeFlow', given)?.value ?? null }
  }
  const density = view.state.stream.get(streamId)?.density ?? null
  if (density === null) return { ...nothing, state: 'missing', reason: 'The density of the stream is not known.' }
  const mass = readCell(view, streamId, view.book.basis === 'mass' ? 'flow' : 'otherFlow', null)
  const kilograms = mass.value === null || !view.units ? null : mass.value * view.units.mass.factor
  return kilograms === null ? nothing : { ...nothing, state: 'solvable', value: kilograms / density, flags: mass.flags }
}

/** The newest answer counts the given of this cell as given, so it was taken, whatever an older list says. */
const isTaken = (found: CellState): boolean => found === CellState.given || found === CellState.atOdds

function reasonOf(view: BookView, quantity: RowQuantity, given: RecordOf<'given'>): string {
  const entry = readEntry(given.text, {
    measure: entryMeasure(given.quantity, view.book.basis),
    unit: rowUnit(view, quantity).symbol,
    decimal: view.decimal,
  })
  return entry.ok ? `“${given.text}” could not be read when it was typed: type it again.` : entry.reason
}

/** The number as the row prints it. */
export function shownNumber(view: BookView, quantity: RowQuantity, reading: Reading, extraDigits = 0): string {
  if (reading.value === null) return ''
  const { decimal } = view
  const style = isFraction(quantity) ? 'percent' : 'flow'
  if (reading.given && (reading.state === 'given' || reading.state === 'atOdds')) {
    const typed = inRow(view, quantity, reading.given)
    return formatNumber(reading.value, style, { decimal, typed: true, halfWidth: typed?.halfWidth ?? null })
  }
  const digits = isFraction(quantity) ? view.digits.fraction : view.digits.flow
  return formatNumber(reading.value, style, { decimal, digits, extraDigits })
}

/** What was typed, as the row prints it, also where it is not used; null where it is no number. */
export function typedNumber(view: BookView, quantity: RowQuantity, given: RecordOf<'given'>): string | null {
  const typed = inRow(view, quantity, given)
  if (!typed) return null
  const style = isFraction(quantity) ? 'percent' : 'flow'
  return formatNumber(typed.value, style, { decimal: view.decimal, typed: true, halfWidth: typed.halfWidth })
}

export const keptWords: Record<NonNullable<Reading['kept']>, string> = {
  check: 'check only',
  withdrawn: 'withdrawn',
  difference: 'by difference',
}

export const stateWords: Record<ReadState, string> = {
  given: 'given',
  solvable: 'solvable now',
  unknown: 'still unknown',
  atOdds: 'at odds',
  absent: 'absent',
  wrong: 'not understood',
  missing: 'not available',
}

/** A flag that asks for a look; a stream without flow is no fault. */
export const isDoubtful = (flags: number): boolean => (flags & ~CellFlag.zeroFlow) !== 0

/** What the flags of a value say, each a sentence. */
export function flagWords(flags: number): string[] {
  const words: string[] = []
  if (flags & CellFlag.negative) words.push('The result is negative: look for a wrong given or a wrong connection.')
  if (flags & CellFlag.aboveOne) words.push('The fraction is above 1: look for a wrong given.')
  if (flags & CellFlag.amplified) words.push('A small error in a given makes a large one here.')
  if (flags & CellFlag.weak) words.push('The uncertainty of this value is large.')
  if (flags & CellFlag.localOnly) words.push('This is one root; others may exist.')
  if (flags & CellFlag.zeroFlow) words.push('The stream has no flow.')
  return words
}
