import type { RecordOf } from './kinds'
import { type BookState, bookOf } from './state'
import { bookUnitOf, convert, parseUnit, unitKindOf } from './units'

type Quantity = RecordOf<'given'>['quantity']

/** The unit that a given without one is in: the book's for its kind of flow, 1 for a fraction. */
export function unitWithout(state: BookState, quantity: Quantity): string | undefined {
  const { basis, flowUnit } = bookOf(state)
  return bookUnitOf(quantity, basis, flowUnit)
}

/** Multiplier between two units of one quantity; undefined where they do not fit each other or the quantity. */
export function unitRatio(quantity: Quantity, from: string, to: string): number | undefined {
  if (from === to) return 1
  const fraction = unitKindOf(quantity, 'mass').endsWith('Fraction')
  if (parseUnit(from)?.of !== (fraction ? 'fraction' : 'flow')) return undefined
  return convert(1, from, to)
}

/** The uncertainty of a given in the unit that it is typed in now; null where there is none or it cannot be carried over. */
export function convertSpread(state: BookState, given: RecordOf<'given'>, unit: string | null): number | null {
  if (given.sigma === null || given.unit === unit) return given.sigma
  const bare = unitWithout(state, given.quantity)
  const [from, to] = [given.unit ?? bare, unit ?? bare]
  const ratio = from === undefined || to === undefined ? undefined : unitRatio(given.quantity, from, to)
  return ratio === undefined ? null : Number((given.sigma * ratio).toPrecision(12))
}
