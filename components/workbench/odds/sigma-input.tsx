'use client'

import { setGivenDetails } from '@/lib/book/edits/givens'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { bookUnitOf } from '@/lib/book/units'
import { plainNumber } from '@/lib/sheet/format'
import { type DecimalSign, readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'

type Given = RecordOf<'given'>
type SigmaInputProps = { view: BookView; desk: Desk; given: Given; autoFocus?: boolean }

/** One standard deviation of a given, in the unit that it is typed in. */
export function SigmaInput({ view, desk, given, autoFocus = false }: SigmaInputProps) {
  const unit = givenUnit(view, given)
  return (
    <CommitInput
      label={`Uncertainty (one standard deviation), ${unit}`}
      inputMode="decimal"
      autoFocus={autoFocus}
      value={given.sigma === null ? '' : plainNumber(given.sigma, view.decimal)}
      onCommit={(text) => {
        const width = readWidth(text, unit, view.decimal, 'uncertainty')
        if (typeof width === 'string') return width
        return desk.run(setGivenDetails(view.state, given.id, { sigma: width }, newId))
      }}
    />
  )
}

/** The unit that a given's widths are in, as written for people. */
export function givenUnit(view: BookView, given: Given): string {
  const bare = given.unit ?? bookUnitOf(given.quantity, view.book.basis, view.book.flowUnit) ?? ''
  return bare === '1' ? 'of 1' : bare
}

/** "± 5" or "5 kg/h" as a width in the unit at hand; null where it is empty; a sentence where it cannot be read. */
export function readWidth(text: string, unit: string, decimal: DecimalSign, what: string): number | null | string {
  if (text.trim() === '') return null
  const number = readNumber(text.replace(/^\s*±\s*/, ''), decimal)
  if (!number.ok) return number.reason
  if (number.rest !== '' && number.rest !== unit) return `The ${what} is in ${unit}: type the number alone.`
  return number.value
}
