import { z } from 'zod'
import type { Context } from '@/lib/auth/context'
import { bookOf, recordsOf } from '@/lib/book/state'
import { ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { atBook } from '../door/enter'
import { bookName, recordId, teamSlug } from '../door/words'
import { withoutBook } from '../records/book-content'
import { stateOfBook } from '../records/load'
import { insertBook } from '../records/new-book'

const input = z.strictObject({ team: teamSlug, book: recordId, name: bookName })

/** Makes a book with the same records in the same project. The document number stays with the first: it names one document. */
export function duplicateBook(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return atBook(
    ctx,
    'book.duplicate',
    input,
    given,
    async (seat, { name }) => {
      const { projectId, name: from, id: source } = seat.book
      const state = await stateOfBook(seat.tx, seat.book)
      const { kind: _, id: __, ...copied } = bookOf(state)
      const fields = { ...copied, name, documentNumber: '' }
      const records = withoutBook(recordsOf(state))
      const made = await insertBook(seat, { projectId, fields, records, label: `Copy of ${from}` })
      if (!made.ok) return made
      const { id } = made.value
      await note(seat, 'book.duplicate', { kind: 'book', id }, { name, source })
      return ok({ id })
    },
    { lock: true },
  )
}
