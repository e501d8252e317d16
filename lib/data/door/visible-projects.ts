import { and, eq, inArray, type SQL } from 'drizzle-orm'
import { project, projectMember } from '@/db/schema/team'
import { seesEveryProject } from '@/lib/auth/permissions'
import type { Seat } from './seat'

/** Which projects of the team the caller sees: all, or the ones they belong to. */
export function visibleProjects({ tx, team, userId, role }: Seat): SQL | undefined {
  const ofTeam = eq(project.teamId, team.id)
  if (seesEveryProject(role)) return ofTeam
  const mine = tx
    .select({ id: projectMember.projectId })
    .from(projectMember)
    .where(and(eq(projectMember.teamId, team.id), eq(projectMember.userId, userId)))
  return and(ofTeam, inArray(project.id, mine))
}
