import type { ChangeConflict } from '@/lib/book/change'
import { calledBy } from '@/lib/book/check'
import { kindNames } from '@/lib/book/kinds'
import type { BookState } from '@/lib/book/state'

/** A refused change in one sentence, with both values where there are two. */
export function sentenceOf(conflicts: readonly ChangeConflict[], state: BookState): string {
  const first = conflicts[0]
  if (!first) return 'This edit no longer fits the book.'
  const record = state[first.kind].get(first.id)
  const called = record ? calledBy(record) : kindNames[first.kind]
  const more = conflicts.length > 1 ? ` (and ${conflicts.length - 1} more)` : ''
  switch (first.code) {
    case 'gone':
      return `This ${kindNames[first.kind]} has been removed meanwhile${more}.`
    case 'exists':
      return `Someone else filled this place meanwhile: ${called}${more}.`
    case 'field':
      return `Changed by someone else since: ${called}, ${first.field} is now ${said(first.theirs)}, was ${said(first.from)}${more}.`
  }
}

const said = (value: unknown): string => (value === null || value === '' ? 'empty' : `"${String(value)}"`)
