import { book } from '@/db/schema/book'
import { newId } from '@/lib/book/ids'
import type { BookRecord, RecordOf } from '@/lib/book/kinds'
import { fail, ok, type Result } from '@/lib/errors'
import type { Seat } from '../door/seat'
import { type Written, writeChange } from './write-change'

/** `records`: all but the book record. `label`: what the book's history begins with. */
export type NewBook = {
  projectId: string
  fields: Omit<RecordOf<'book'>, 'kind' | 'id'>
  records: readonly BookRecord[]
  label: string
}

/** Makes a book's row and, as its first change, everything in it: a new book is written by the one writer too. */
export async function insertBook(
  { tx, team, userId }: Seat,
  { projectId, fields, records, label }: NewBook,
): Promise<Result<{ id: string; written: Written }>> {
  const values = { id: newId(), teamId: team.id, projectId, ...fields, createdBy: userId, changedBy: userId }
  const [row] = await tx.insert(book).values(values).returning()
  if (!row) throw new Error('The new book was not written')
  const change = { id: newId(), label, create: [...records], update: [], remove: [] }
  const outcome = await writeChange(tx, userId, row, change)
  if (outcome.ok) return ok({ id: row.id, written: outcome.value })
  return fail('internal', 'The records of a new book do not fit together.', { detail: outcome.error })
}
