import { and, asc, eq, gt, sql } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { bookChange } from '@/db/schema/book'
import type { Context } from '@/lib/auth/context'
import type { Change } from '@/lib/book/change'
import { ok, type Result } from '@/lib/errors'
import { atBook } from '../door/enter'
import { recordId } from '../door/words'
import { storedChange } from '../records/stored-change'

const input = z.strictObject({ book: recordId, after: z.number().int().min(0) })

/** At most so many changes to an answer, and not many more bytes than this, but always one where there is one. */
const pageChanges = 200
const pageBytes = 2_000_000

export type ListedChange = { number: number; change: Change; by: { id: string; name: string }; at: Date }

/** The changes of a book after a number, in order. `number` is the book's: ask again while the last one is below it. */
export function listChanges(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ number: number; changes: ListedChange[] }>> {
  return atBook(
    ctx,
    'book.read',
    input,
    given,
    async ({ tx, book }, { after }) => {
      const later = and(eq(bookChange.bookId, book.id), gt(bookChange.number, after))
      const sizes = tx
        .select({
          number: bookChange.number,
          before: sql<string>`sum(pg_column_size(${bookChange.body})) over (order by ${bookChange.number})
            - pg_column_size(${bookChange.body})`.as('before'),
        })
        .from(bookChange)
        .where(later)
        .orderBy(asc(bookChange.number))
        .limit(pageChanges)
        .as('sizes')
      const rows = await tx
        .select({ row: bookChange, by: { id: user.id, name: user.name } })
        .from(bookChange)
        .innerJoin(sizes, eq(sizes.number, bookChange.number))
        .innerJoin(user, eq(user.id, bookChange.by))
        .where(and(eq(bookChange.bookId, book.id), sql`${sizes.before} < ${pageBytes}`))
        .orderBy(asc(bookChange.number))
      const changes = rows.map(({ row, by }) => ({ number: row.number, change: storedChange(row), by, at: row.at }))
      return ok({ number: book.number, changes })
    },
    { readOnly: true },
  )
}
