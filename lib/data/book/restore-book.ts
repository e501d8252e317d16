import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { book } from '@/db/schema/book'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { atBook } from '../door/enter'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, book: recordId })

/** Brings an archived book back into the list and to work. Not archived: nothing to do. */
export function restoreBook(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return atBook(
    ctx,
    'book.restore',
    input,
    given,
    async (seat) => {
      const { id, archivedAt } = seat.book
      if (archivedAt === null) return ok({ id })
      await seat.tx.update(book).set({ archivedAt: null }).where(eq(book.id, id))
      await note(seat, 'book.restore', { kind: 'book', id })
      return ok({ id })
    },
    { lock: true },
  )
}
