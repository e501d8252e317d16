import { z } from 'zod'
import type { Context } from '@/lib/auth/context'
import { type Change, changeSchema } from '@/lib/book/change'
import { failParse, ok, type Result } from '@/lib/errors'
import { atBook } from '../door/enter'
import { bookArchived, signedOut } from '../door/refusals'
import { recordId } from '../door/words'
import { stateCache } from '../records/state-cache'
import { earlierResult, type NotWritten, type WriteOutcome, writeChange } from '../records/write-change'

const bookInput = z.strictObject({ book: recordId })
const input = z.strictObject({
  book: recordId,
  changes: z.array(changeSchema).min(1).max(500, 'holds more than 500 changes: send fewer at a time'),
})

export type WriteResult = { id: string; ok: true; number: number } | ({ id: string; ok: false } & NotWritten)

/**
 * Writes changes to a book in their order, each in a transaction of its own, and stops at the first that cannot be
 * written: those behind it were made on top of it. Sending a change again does no harm. `number` is the book's at the end.
 */
export async function writeChanges(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ number: number; results: WriteResult[] }>> {
  if (ctx.userId === null) return signedOut()
  const parsed = input.safeParse(given)
  if (!parsed.success) return failParse(parsed.error, 'These changes are not in the form that a book takes.')
  // What was sent is written, not what parsing made of it: sender and server must hold the same records.
  const changes: readonly Change[] = given.changes
  const results: WriteResult[] = []
  let number = 0
  for (const change of changes) {
    const written = await writeOne(ctx, parsed.data.book, change)
    if (!written.ok) return written
    const { outcome } = written.value
    number = written.value.number
    if (!outcome.ok) {
      results.push({ id: change.id, ok: false, ...outcome.error })
      break
    }
    results.push({ id: change.id, ok: true, number: outcome.value.number })
  }
  return ok({ number, results })
}

/** `number`: the book's afterwards. */
async function writeOne(
  ctx: Context,
  bookId: string,
  change: Change,
): Promise<Result<{ outcome: WriteOutcome; number: number }>> {
  const written = await atBook(
    ctx,
    'book.edit',
    bookInput,
    { book: bookId },
    async ({ tx, userId, book }) => {
      const isArchived = book.archivedAt !== null
      const outcome = await (isArchived ? earlierResult(tx, book.id, change) : writeChange(tx, userId, book, change))
      if (!outcome) return bookArchived()
      return ok({ outcome, number: outcome.ok ? Math.max(book.number, outcome.value.number) : book.number })
    },
    { lock: true },
  )
  if (written.ok && written.value.outcome.ok) {
    const { number, state } = written.value.outcome.value
    if (state) stateCache.put(bookId, number, state)
  }
  return written
}
