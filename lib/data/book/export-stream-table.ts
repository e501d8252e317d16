import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { inOrder } from '@/lib/book/state'
import { fail, ok, type Result } from '@/lib/errors'
import { fileName } from '@/lib/export/file-name'
import { streamTableOffThread } from '@/lib/export/off-thread'
import type { StreamTableRequest } from '@/lib/export/stream-table-file'
import { atBook } from '../door/enter'
import { settingsOf } from '../door/team-settings'
import { recordId, teamSlug } from '../door/words'
import { stateOfBook } from '../records/load'

/** `case` left out: the first operating case. */
const input = z.strictObject({ book: recordId, team: teamSlug.optional(), case: recordId.optional() })

export type StreamTableFile = { name: string; bytes: Uint8Array<ArrayBuffer> }

/** The stream table of a book as .xlsx. Whoever may read the book may take it along; the work is done in another thread. */
export async function exportStreamTable(ctx: Context, given: z.input<typeof input>): Promise<Result<StreamTableFile>> {
  // The transaction ends before the work begins: a thread at work holds no connection.
  const read = await readRequest(ctx, given)
  if (!read.ok) return read
  const { title } = read.value
  const bytes = await streamTableOffThread(read.value)
  if (!bytes.ok) return bytes
  const name = fileName([title.documentNumber, title.title, 'stream table'], '.xlsx')
  return ok({ name, bytes: bytes.value })
}

function readRequest(ctx: Context, given: z.input<typeof input>): Promise<Result<StreamTableRequest>> {
  return atBook(
    ctx,
    'book.read',
    input,
    given,
    async ({ tx, book, team, project }, { case: caseId }) => {
      const state = await stateOfBook(tx, book)
      const operatingCase = caseId === undefined ? inOrder(state.case)[0] : state.case.get(caseId)
      if (!operatingCase) return fail('notFound', 'There is no such operating case in this book.')
      const [creator] = await tx.select({ name: user.name }).from(user).where(eq(user.id, book.createdBy))
      const title = {
        owner: team.name,
        project: project.name,
        title: book.name,
        documentNumber: book.documentNumber,
        revision: 'preliminary draft',
        issued: null,
        made: new Date().toISOString().slice(0, 10),
        creator: creator?.name ?? '',
        checked: null,
        approved: null,
        documentType: 'Stream table',
        caseName: operatingCase.name,
        basis: `${book.basis === 'mass' ? 'Mass' : 'Mole'}, ${book.flowUnit}`,
      }
      const { closureLimit } = await settingsOf(tx, team.id)
      return ok({ state, caseId: operatingCase.id, title, bookNumber: book.number, closureLimit })
    },
    { readOnly: true },
  )
}
