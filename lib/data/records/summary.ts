import { eq, sql } from 'drizzle-orm'
import { db } from '@/db/client'
import { book, bookSummary } from '@/db/schema/book'
import { type Summary, solve } from '@/lib/balance'
import { type BookState, inOrder } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import { fail, ok } from '@/lib/errors'
import { logger } from '@/lib/http/logger'
import { transact } from '../door/transact'
import { stateOfBook } from './load'

/** State counts of a book's first operating case. */
export type BookSummary = Pick<Summary, 'given' | 'solvable' | 'unknown' | 'atOdds' | 'degreesOfFreedom'>

/** Above so many cells a solve would hold up other requests for too long: such a book has no counts in the list. */
const mostCells = 6_000

/** Counts of the first operating case; null: too large, no case, or the solver gave up. */
export function summaryOf(state: BookState): BookSummary | null {
  const [first] = inOrder(state.case)
  if (!first || state.stream.size * (1 + 2 * state.component.size) > mostCells) return null
  const { status, summary } = solve(toProblem(state, first.id).problem)
  if (status === 'gaveUp') return null
  const { given, solvable, unknown, atOdds, degreesOfFreedom } = summary
  return { given, solvable, unknown, atOdds, degreesOfFreedom }
}

/**
 * Reckons a book's counts as it stands now and keeps them under its number. They are a convenience of the list: a book
 * whose counts cannot be reckoned is logged and has none.
 */
export async function refreshSummary(id: string): Promise<{ number: number; summary: BookSummary } | undefined> {
  const read = await transact(
    async (tx) => {
      const [row] = await tx.select().from(book).where(eq(book.id, id))
      return row ? ok({ number: row.number, state: await stateOfBook(tx, row) }) : fail('notFound', 'No such book.')
    },
    { readOnly: true },
  )
  if (!read.ok) return undefined
  const { number, state } = read.value
  try {
    const summary = summaryOf(state)
    if (!summary) return undefined
    const values = { number, ...summary, at: sql`now()` }
    await db
      .insert(bookSummary)
      .values({ bookId: id, ...values })
      .onConflictDoUpdate({
        target: bookSummary.bookId,
        set: values,
        setWhere: sql`${bookSummary.number} <= ${number}`,
      })
    return { number, summary }
  } catch (err) {
    logger().error({ err, bookId: id, number }, 'the counts of a book could not be reckoned')
    return undefined
  }
}
