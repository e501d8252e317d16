import { and, asc, eq, isNull, sql } from 'drizzle-orm'
import { z } from 'zod'
import { book } from '@/db/schema/book'
import { project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { mayDo } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { visibleProjects } from '../door/visible-projects'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

/** `bookCount`: books not archived that the caller may open. */
export type ProjectView = { id: string; name: string; bookCount: number }

/** The projects of a team that the caller sees, by name. */
export function listProjects(ctx: Context, given: z.input<typeof input>): Promise<Result<ProjectView[]>> {
  return inTeam(
    ctx,
    'project.list',
    input,
    given,
    async (seat) => {
      const rows = await seat.tx
        .select({ id: project.id, name: project.name, bookCount: sql<number>`count(${book.id})::int` })
        .from(project)
        .leftJoin(book, and(eq(book.projectId, project.id), eq(book.teamId, seat.team.id), isNull(book.archivedAt)))
        .where(visibleProjects(seat))
        .groupBy(project.id)
        .orderBy(asc(project.name), asc(project.id))
      return ok(mayDo(seat.role, 'book.read') ? rows : rows.map((row) => ({ ...row, bookCount: 0 })))
    },
    { readOnly: true },
  )
}
