import { CellFlag, CellState, slotOf } from '@/lib/balance/solution'
import { absenceId, type StreamId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { bookUnitOf, convert } from '@/lib/book/units'

import { entryMeasure, readEntry } from '@/lib/sheet/entry'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, cellKey, isFraction, measureOfRow, rowScale, rowStyle, rowUnit } from './book-view'
import { whyNoMeasure } from './measure-reading'
import type { RowPlace } from './rows'

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
  row: RowPlace,
  given: RecordOf<'given'>,
): { value: number; halfWidth: number | null } | null {
  if (given.value === null) return null
  const { basis, flowUnit } = view.book
  const from = given.unit ?? bookUnitOf(given.quantity, basis, flowUnit)
  const to = rowUnit(view, row).symbol
  if (from === to) return { value: given.value, halfWidth: given.halfWidth }
  const value = from === undefined ? undefined : convert(given.value, from, to)
  if (from === undefined || value === undefined) return null
  const halfWidth = given.halfWidth === null ? null : (convert(given.halfWidth, from, to) ?? null)
  return { value: Number(value.toPrecision(14)), halfWidth }
}

/** What the solver found for a cell, in its own units. */
type Found = { state: CellState; value: number; flags: number; slot: number | null }

function foundAt({ solved }: BookView, streamId: StreamId, row: RowPlace): Found {
  const nothing: Found = { state: CellState.unknown, value: Number.NaN, flags: 0, slot: null }
  const stream = solved?.streamIndex.get(streamId)
  if (!solved || stream === undefined) return nothing
  const { solution } = solved
  const { quantity, componentId } = row
  if (quantity === 'measure' || quantity === 'volumeFlow') {
    const index = solved.rowIndex.get(row.measureId ?? quantity)
    if (index === undefined || !solution.wanted) return nothing
    const { states, values, flags } = solution.wanted
    const at = index * solution.nStreams + stream
    return { state: states[at] as CellState, value: values[at] as number, flags: flags[at] ?? 0, slot: null }
  }
  const component = componentId === null ? 0 : solved.componentIndex.get(componentId)
  if (component === undefined) return nothing
  const slot = slotOf(solution.nComponents, stream, quantity, component)
  const { states, values, flags } = solution
  return { state: states[slot] as CellState, value: values[slot] ?? Number.NaN, flags: flags[slot] ?? 0, slot }
}

/** The cell of a stream: what is typed there comes first, then what the solver found. */
export function readCell(view: BookView, streamId: StreamId, row: RowPlace): Reading {
  const { state } = view
  const { quantity, componentId } = row
  const list = view.givensAt.get(cellKey(streamId, row)) ?? []
  const given = list[0] ?? null
  const others = list.slice(1)
  const kept = given && given.use !== 'given' ? given.use : null
  const nothing: Reading = { state: 'unknown', value: null, given, kept, others, flags: 0, slot: null, reason: null }
  if (componentId !== null && state.absence.has(absenceId(streamId, componentId)))
    return { ...nothing, state: 'absent', reason: given ? (view.leftOut.get(given.id) ?? null) : null }
  const { state: found, value: raw, flags, slot } = foundAt(view, streamId, row)
  const computed = Number.isNaN(raw) ? null : raw * rowScale(view, row)
  if (given && given.value === null)
    return { ...nothing, state: 'wrong', flags, slot, reason: reasonOf(view, row, given) }
  if (given && given.use === 'given') {
    const typed = inRow(view, row, given)
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
  const why = quantity === 'volumeFlow' || quantity === 'measure' ? whyNoMeasure(view, streamId, row) : null
  if (why) return { ...nothing, ...why, slot }
  if (found === CellState.absent && quantity.startsWith('other'))
    return { ...nothing, state: 'missing', slot, reason: 'A molar mass is missing' }
  return { ...nothing, state: 'unknown', slot }
}

/** A typed fraction that the person lets follow from the others. */
function isByDifference(
  view: BookView,
  streamId: StreamId,
  quantity: RowPlace['quantity'],
  componentId: string | null,
): boolean {
  const stream = view.state.stream.get(streamId)
  return isFraction(quantity) && stream?.fractions === 'difference' && stream.differenceComponentId === componentId
}

/** The newest answer counts the given of this cell as given, so it was taken, whatever an older list says. */
const isTaken = (found: CellState): boolean => found === CellState.given || found === CellState.atOdds

function reasonOf(view: BookView, row: RowPlace, given: RecordOf<'given'>): string {
  const entry = readEntry(given.text, {
    measure: entryMeasure(given.quantity, view.book.basis),
    unit: rowUnit(view, row).symbol,
    decimal: view.decimal,
  })
  return entry.ok ? `“${given.text}” could not be read when it was typed: type it again.` : entry.reason
}

/** The number as the row prints it. */
export function shownNumber(view: BookView, row: RowPlace, reading: Reading, extraDigits = 0): string {
  if (reading.value === null) return ''
  const { decimal } = view
  const style = rowStyle(view, row)
  if (reading.given && (reading.state === 'given' || reading.state === 'atOdds')) {
    const typed = inRow(view, row, reading.given)
    return formatNumber(reading.value, style, { decimal, typed: true, halfWidth: typed?.halfWidth ?? null })
  }
  const isRatio = isFraction(row.quantity) || measureOfRow(view, row) !== undefined
  const digits = isRatio ? view.digits.fraction : view.digits.flow
  return formatNumber(reading.value, style, { decimal, digits, extraDigits })
}

/** What was typed, as the row prints it, also where it is not used; null where it is no number. */
export function typedNumber(view: BookView, row: RowPlace, given: RecordOf<'given'>): string | null {
  const typed = inRow(view, row, given)
  if (!typed) return null
  const style = rowStyle(view, row)
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
  if (flags & CellFlag.localOnly)
    words.push('It was found by search from several starts: it fits, but that nothing else fits is not proved.')
  if (flags & CellFlag.zeroFlow) words.push('The stream has no flow.')
  return words
}

/** The same for one cell, with how much an error in a given grows on its way here. */
export function noteWords(
  view: BookView,
  flags: number,
  amplification: number | undefined,
  hasValue: boolean,
): string[] {
  if (amplification === undefined) return flagWords(flags)
  const times = formatNumber(Number(amplification.toPrecision(2)), 'flow', { decimal: view.decimal })
  const grows = `A relative error in its worst given comes out about ${times} times as large here: ${hasValue ? 'measure it more directly, or do not lean on it' : 'too large for a value to mean anything'}.`
  return [grows, ...flagWords(flags & ~CellFlag.amplified)]
}
