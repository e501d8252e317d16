import type { ChangeConflict } from './change'
import { calledBy } from './check'
import { placeName } from './edits/place'
import { type BookRecord, type FieldValue, kindNames } from './kinds'
import type { BookState } from './state'

/** Why a change no longer applies, in a sentence with both values. `state` is the book as it stands. */
export function conflictText(state: BookState, conflict: ChangeConflict): string {
  const current = (state[conflict.kind] as ReadonlyMap<string, BookRecord>).get(conflict.id)
  if (conflict.code === 'gone') return `A ${kindNames[conflict.kind]} that this edits has been removed since.`
  if (conflict.code === 'exists') {
    const [theirs, mine] = [told(conflict.theirs), told(conflict.mine)]
    const both = theirs === undefined ? '' : `: it now says ${theirs}, yours was ${mine}`
    return `${nameOf(state, conflict.theirs)} has been filled in by someone else since${both}.`
  }
  const name = current ? nameOf(state, current) : `A ${kindNames[conflict.kind]}`
  const mine = conflict.mine === undefined ? 'you wanted to remove it' : `you wanted ${shown(conflict.mine)}`
  const field = conflict.field === 'text' || conflict.field === 'value' ? '' : ` (${conflict.field})`
  return `${name}${field} has been changed since, from ${shown(conflict.from)} to ${shown(conflict.theirs)}; ${mine}.`
}

function nameOf(state: BookState, record: BookRecord): string {
  if (record.kind === 'given') return placeName(state, record)
  const name = calledBy(record)
  return `${name[0]?.toUpperCase()}${name.slice(1)}`
}

const told = (record: BookRecord): string | undefined => (record.kind === 'given' ? `“${record.text}”` : undefined)

const shown = (value: FieldValue): string => (value === null || value === '' ? 'empty' : `“${value}”`)

/** Several of them in one line: the first in full, then how many more. */
export function conflictsText(state: BookState, conflicts: readonly ChangeConflict[]): string {
  const [first] = conflicts
  if (!first) return 'This edit no longer fits the book.'
  const rest = conflicts.length > 1 ? ` (and ${conflicts.length - 1} more)` : ''
  return `${conflictText(state, first)}${rest}`
}
