import { and, asc, eq, sql } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { member, project, projectMember } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { type Role, seesEveryProject } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

export type MemberView = {
  userId: string
  name: string
  email: string
  role: Role
  state: 'active' | 'deactivated'
  /** 'all': the role sees every project. */
  projects: 'all' | { id: string; name: string }[]
  hasSecondFactor: boolean
  joinedAt: Date
  deactivatedAt: Date | null
  isYou: boolean
  /** The only owner who can still sign in to the team: cannot leave it or become something else. */
  isLastOwner: boolean
}

/** The people of a team, by name; those who were let go at the end. */
export function listMembers(ctx: Context, given: z.input<typeof input>): Promise<Result<MemberView[]>> {
  return inTeam(
    ctx,
    'member.list',
    input,
    given,
    async ({ tx, team, userId: me }) => {
      const { role, deactivatedAt, createdAt: joinedAt } = member
      const person = { userId: user.id, name: user.name, email: user.email, hasSecondFactor: user.twoFactorEnabled }
      const people = await tx
        .select({ ...person, role, deactivatedAt, joinedAt })
        .from(member)
        .innerJoin(user, eq(user.id, member.userId))
        .where(eq(member.teamId, team.id))
        .orderBy(sql`${deactivatedAt} is not null`, asc(user.name), asc(user.id))
      const belongings = await tx
        .select({ userId: projectMember.userId, id: project.id, name: project.name })
        .from(projectMember)
        .innerJoin(project, eq(project.id, projectMember.projectId))
        .where(and(eq(projectMember.teamId, team.id), eq(project.teamId, team.id)))
        .orderBy(asc(project.name))
      const owners = people.filter((row) => row.role === 'owner' && row.deactivatedAt === null)
      return ok(
        people.map((row) => ({
          ...row,
          state: row.deactivatedAt === null ? ('active' as const) : ('deactivated' as const),
          projects: seesEveryProject(row.role)
            ? ('all' as const)
            : belongings.filter(({ userId }) => userId === row.userId).map(({ id, name }) => ({ id, name })),
          isYou: row.userId === me,
          isLastOwner: owners.length === 1 && owners[0]?.userId === row.userId,
        })),
      )
    },
    { readOnly: true },
  )
}
