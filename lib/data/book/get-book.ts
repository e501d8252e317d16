import { z } from 'zod'
import type { Context } from '@/lib/auth/context'
import { mayDo, type Role } from '@/lib/auth/permissions'
import type { BookRecord } from '@/lib/book/kinds'
import { recordsOf } from '@/lib/book/state'
import { ok, type Result } from '@/lib/errors'
import { atBook } from '../door/enter'
import { type BookSettings, bookSettings, settingsOf } from '../door/team-settings'
import { recordId, teamSlug } from '../door/words'
import { stateOfBook } from '../records/load'
import { stateCache } from '../records/state-cache'

const input = z.strictObject({ book: recordId, team: teamSlug.optional() })

/** A whole book at its present number. `records`: the book record first, each kind after those it points at. */
export type BookSnapshot = {
  id: string
  team: { slug: string; name: string }
  project: { id: string; name: string }
  number: number
  records: BookRecord[]
  role: Role
  mayEdit: boolean
  archived: boolean
  /** What the team has chosen for how books are shown and judged. */
  settings: BookSettings
}

/** Reads a book. Where `team` is given, a book of another team is not found. */
export function getBook(ctx: Context, given: z.input<typeof input>): Promise<Result<BookSnapshot>> {
  return atBook(
    ctx,
    'book.read',
    input,
    given,
    async ({ tx, book, team, project, role }) => {
      const { id, number } = book
      const state = await stateOfBook(tx, book)
      // Read in one moment of the database, where all that is seen is committed: others may have it.
      stateCache.put(id, number, state)
      const archived = book.archivedAt !== null
      const { slug, name } = team
      const mayEdit = !archived && mayDo(role, 'book.edit')
      const records = recordsOf(state)
      const settings = bookSettings(await settingsOf(tx, team.id))
      return ok({ id, team: { slug, name }, project, number, records, role, mayEdit, archived, settings })
    },
    { readOnly: true },
  )
}
