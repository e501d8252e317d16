import { and, eq, inArray, isNull, ne } from 'drizzle-orm'
import { user } from '@/db/schema/account'
import { member, project, projectMember } from '@/db/schema/team'
import { isRole, type Role } from '@/lib/auth/permissions'
import { fail, ok, type Result } from '@/lib/errors'
import { noSuchMember } from './refusals'
import type { Seat } from './seat'

/** Somebody of the team, in or let go. */
export type MemberRow = { userId: string; name: string; email: string; role: Role; deactivatedAt: Date | null }

export async function memberOf({ tx, team }: Seat, userId: string): Promise<Result<MemberRow>> {
  const { role, deactivatedAt } = member
  const [row] = await tx
    .select({ userId: user.id, name: user.name, email: user.email, role, deactivatedAt })
    .from(member)
    .innerJoin(user, eq(user.id, member.userId))
    .where(and(eq(member.teamId, team.id), eq(member.userId, userId)))
  return row && isRole(row.role) ? ok(row) : noSuchMember()
}

/** Whether the team would be without an owner if this one went. True answers need the team's lock to stay true. */
export async function isLastOwner({ tx, team }: Seat, who: MemberRow): Promise<boolean> {
  if (who.role !== 'owner' || who.deactivatedAt !== null) return false
  const isOther = and(eq(member.teamId, team.id), eq(member.role, 'owner'), ne(member.userId, who.userId))
  const [other] = await tx
    .select({ id: member.id })
    .from(member)
    .where(and(isOther, isNull(member.deactivatedAt)))
    .limit(1)
  return other === undefined
}

/** The names of these projects, if all are the team's. */
export async function projectsOfTeam({ tx, team }: Seat, ids: string[]): Promise<Result<string[]>> {
  if (ids.length === 0) return ok([])
  const rows = await tx
    .select({ name: project.name })
    .from(project)
    .where(and(eq(project.teamId, team.id), inArray(project.id, ids)))
    .orderBy(project.name)
  if (rows.length === ids.length) return ok(rows.map(({ name }) => name))
  return fail('notFound', 'One of these projects is not in this team. Read the list again.')
}

/** Somebody belongs to these projects from now on, and to no others of the team. */
export async function putInProjects({ tx, team }: Seat, userId: string, ids: string[]): Promise<void> {
  await tx.delete(projectMember).where(and(eq(projectMember.teamId, team.id), eq(projectMember.userId, userId)))
  if (ids.length === 0) return
  await tx.insert(projectMember).values(ids.map((projectId) => ({ teamId: team.id, projectId, userId })))
}
