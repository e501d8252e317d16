import { and, eq, sql } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { book, bookChange } from '@/db/schema/book'
import { apply, type Change, type ChangeConflict } from '@/lib/book/change'
import { check, type RecordProblem } from '@/lib/book/check'
import type { BookState } from '@/lib/book/state'
import type { BookRow } from '../door/seat'
import { bodyHash } from './body-hash'
import { stateOfBook } from './load'
import { misfits } from './misfits'
import { writeRows } from './write-rows'

/** The shape of a stored change's body. Older ones are upgraded when read. */
export const changeVersion = 1

/** What became of a change. `state`: after it, for the cache, once it is committed; absent when it was written before. */
export type Written = { number: number; state?: BookState }
export type NotWritten =
  | { code: 'conflict'; conflicts: ChangeConflict[] }
  | { code: 'rejected'; problems: RecordProblem[] | 'idReused' }
export type WriteOutcome = { ok: true; value: Written } | { ok: false; error: NotWritten }

const refuse = (error: NotWritten): WriteOutcome => ({ ok: false, error })

/**
 * Writes one change to a book whose row this transaction has locked: whole or not at all, under the book's next number.
 * The same id again is answered with the first result; with another body, refused.
 */
export async function writeChange(
  tx: Transaction,
  userId: string,
  row: BookRow,
  change: Change,
): Promise<WriteOutcome> {
  const bookId = row.id
  const misfit = misfits(change)
  if (misfit.length > 0) return refuse({ code: 'rejected', problems: misfit })
  const earlier = await earlierResult(tx, bookId, change)
  if (earlier) return earlier
  const before = await stateOfBook(tx, row)
  const applied = apply(before, change)
  if (!applied.ok) return refuse({ code: 'conflict', conflicts: applied.conflicts })
  const problems = check(applied.state, change)
  if (problems.length > 0) return refuse({ code: 'rejected', problems })

  await writeRows(tx, bookId, applied.state, change)
  const number = row.number + 1
  const { id, label, create, update, remove } = change
  const body = { create, update, remove }
  await tx
    .insert(bookChange)
    .values({ bookId, number, id, schemaVersion: changeVersion, label, body, bodyHash: bodyHash(change), by: userId })
  await tx.update(book).set({ number, changedBy: userId, changedAt: sql`now()` }).where(eq(book.id, bookId))
  return { ok: true, value: { number, state: applied.state } }
}

/** What a change of this id was answered when it was written; undefined: it was not. */
export async function earlierResult(
  tx: Transaction,
  bookId: string,
  change: Change,
): Promise<WriteOutcome | undefined> {
  const [earlier] = await tx
    .select({ number: bookChange.number, hash: bookChange.bodyHash })
    .from(bookChange)
    .where(and(eq(bookChange.bookId, bookId), eq(bookChange.id, change.id)))
  if (!earlier) return undefined
  if (earlier.hash !== bodyHash(change)) return refuse({ code: 'rejected', problems: 'idReused' })
  return { ok: true, value: { number: earlier.number } }
}
