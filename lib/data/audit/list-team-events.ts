import { and, desc, eq, sql } from 'drizzle-orm'
import { type AnyPgColumn, alias } from 'drizzle-orm/pg-core'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { book } from '@/db/schema/book'
import { invitation, project, teamEvent } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { recordId, teamSlug } from '../door/words'

/** `after`: the `next` of the page before. */
const input = z.strictObject({
  team: teamSlug,
  after: recordId.optional(),
  limit: z.number().int().min(1).max(200).default(50),
})

export type TeamEventView = {
  id: string
  at: Date
  by: { id: string; name: string }
  /** Such as `member.changeRole`: see the actions of the permission table, and `Doing`. */
  action: string
  /** `name`: as it is now; null where it is no more. */
  subject: { kind: string; id: string; name: string | null }
  detail: Record<string, unknown>
}

/** What was done in a team, the newest first, a page at a time. Edits of books are in the history of each book. */
export function listTeamEvents(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ events: TeamEventView[]; next: string | null }>> {
  return inTeam(
    ctx,
    'event.list',
    input,
    given,
    async ({ tx, team }, { after, limit }) => {
      const doer = alias(user, 'doer')
      const subjectIs = (kind: string, id: AnyPgColumn) =>
        and(eq(teamEvent.subjectKind, kind), eq(teamEvent.subjectId, id))
      const rows = await tx
        .select({
          id: teamEvent.id,
          at: teamEvent.at,
          by: { id: doer.id, name: doer.name },
          action: teamEvent.action,
          subject: {
            kind: teamEvent.subjectKind,
            id: teamEvent.subjectId,
            name: sql<string | null>`coalesce(${user.name}, ${book.name}, ${project.name}, ${invitation.email})`,
          },
          detail: teamEvent.detail,
        })
        .from(teamEvent)
        .innerJoin(doer, eq(doer.id, teamEvent.by))
        .leftJoin(user, subjectIs('member', user.id))
        .leftJoin(book, and(subjectIs('book', book.id), eq(book.teamId, team.id)))
        .leftJoin(project, and(subjectIs('project', project.id), eq(project.teamId, team.id)))
        .leftJoin(invitation, and(subjectIs('invitation', invitation.id), eq(invitation.teamId, team.id)))
        .where(and(eq(teamEvent.teamId, team.id), after === undefined ? undefined : olderThan(team.id, after)))
        .orderBy(desc(teamEvent.at), desc(teamEvent.id))
        .limit(limit + 1)
      const events = rows.slice(0, limit)
      return ok({ events, next: rows.length > limit ? (events.at(-1)?.id ?? null) : null })
    },
    { readOnly: true },
  )
}

/** Compared in the database: its moments are finer than a Date. An event that is not the team's: nothing is older. */
const olderThan = (teamId: string, id: string) =>
  sql`(${teamEvent.at}, ${teamEvent.id}) < (select e.at, e.id from ${teamEvent} e where e.id = ${id} and e.team_id = ${teamId})`
