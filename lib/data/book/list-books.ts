import { and, desc, eq, isNotNull, isNull } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { book, bookSummary } from '@/db/schema/book'
import { project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { mayDo } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { visibleProjects } from '../door/visible-projects'
import { teamSlug } from '../door/words'
import { type BookSummary, refreshSummary } from '../records/summary'

const input = z.strictObject({ team: teamSlug, archived: z.boolean().optional() })

export type BookListed = {
  id: string
  name: string
  documentNumber: string
  projectId: string
  projectName: string
  state: 'draft'
  number: number
  changedAt: Date
  changedBy: { id: string; name: string } | null
  basis: 'mass' | 'mole'
  /** Of the first operating case; null: not reckoned for the book as it stands. */
  summary: BookSummary | null
  archivedAt: Date | null
}

const summaryColumns = {
  given: bookSummary.given,
  solvable: bookSummary.solvable,
  unknown: bookSummary.unknown,
  atOdds: bookSummary.atOdds,
  degreesOfFreedom: bookSummary.degreesOfFreedom,
}

/** Milliseconds that reckoning may add to a list. */
const longestReckoning = 300

/** The books of a team that the caller may open, last changed first: those at work, or the archived ones. */
export async function listBooks(ctx: Context, given: z.input<typeof input>): Promise<Result<BookListed[]>> {
  const listed = await inTeam(
    ctx,
    'book.list',
    input,
    given,
    async (seat, { archived = false }) => {
      if (!mayDo(seat.role, 'book.read')) return ok([])
      const rows = await seat.tx
        .select({
          id: book.id,
          name: book.name,
          documentNumber: book.documentNumber,
          projectId: book.projectId,
          projectName: project.name,
          number: book.number,
          changedAt: book.changedAt,
          changedBy: { id: user.id, name: user.name },
          basis: book.basis,
          summary: summaryColumns,
          archivedAt: book.archivedAt,
        })
        .from(book)
        .innerJoin(project, eq(project.id, book.projectId))
        .leftJoin(user, eq(user.id, book.changedBy))
        .leftJoin(bookSummary, and(eq(bookSummary.bookId, book.id), eq(bookSummary.number, book.number)))
        .where(
          and(
            eq(book.teamId, seat.team.id),
            visibleProjects(seat),
            archived ? isNotNull(book.archivedAt) : isNull(book.archivedAt),
          ),
        )
        .orderBy(desc(book.changedAt), book.id)
      return ok(rows.map((row): BookListed => ({ ...row, state: 'draft' })))
    },
    { readOnly: true },
  )
  return listed.ok ? ok(await withSummaries(listed.value)) : listed
}

/** Counts that are missing or behind are reckoned now, for as long as a list may take; the rest come with the next list. */
async function withSummaries(books: BookListed[]): Promise<BookListed[]> {
  const until = performance.now() + longestReckoning
  const shown: BookListed[] = []
  for (const listed of books) {
    if (listed.summary || performance.now() > until) shown.push(listed)
    else {
      const fresh = await refreshSummary(listed.id)
      shown.push({ ...listed, summary: fresh?.number === listed.number ? fresh.summary : null })
    }
  }
  return shown
}
