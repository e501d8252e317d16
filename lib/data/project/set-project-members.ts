import { and, eq, inArray } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { member, project, projectMember } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { seesEveryProject } from '@/lib/auth/permissions'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { noSuchMember, noSuchProject } from '../door/refusals'
import type { Seat } from '../door/seat'
import { recordId, teamSlug } from '../door/words'

const users = z
  .array(recordId)
  .max(1000)
  .transform((ids) => [...new Set(ids)])
const input = z.strictObject({ team: teamSlug, project: recordId, users })

/** Says which analysts and readers belong to a project: these, and no others. The other roles see it in any case. */
export function setProjectMembers(ctx: Context, given: z.input<typeof input>): Promise<Result<{ project: string }>> {
  return inLockedTeam(ctx, 'member.setProjects', input, given, async (seat, { project: id, users: ids }) => {
    const { tx, team } = seat
    const ofTeam = and(eq(project.teamId, team.id), eq(project.id, id))
    const [found] = await tx.select({ name: project.name }).from(project).where(ofTeam)
    if (!found) return noSuchProject()
    const people = await peopleOf(seat, ids)
    if (people.length !== ids.length) return noSuchMember()
    const all = people.find(({ role }) => seesEveryProject(role))
    if (all) return fail('conflict', `${all.name} is ${all.role} here and sees every project.`)
    await tx.delete(projectMember).where(and(eq(projectMember.teamId, team.id), eq(projectMember.projectId, id)))
    if (ids.length > 0)
      await tx.insert(projectMember).values(ids.map((userId) => ({ teamId: team.id, projectId: id, userId })))
    const detail = { name: found.name, people: people.map(({ name }) => name) }
    await note(seat, 'member.setProjects', { kind: 'project', id }, detail)
    return ok({ project: id })
  })
}

async function peopleOf({ tx, team }: Seat, ids: string[]) {
  if (ids.length === 0) return []
  return tx
    .select({ name: user.name, role: member.role })
    .from(member)
    .innerJoin(user, eq(user.id, member.userId))
    .where(and(eq(member.teamId, team.id), inArray(member.userId, ids)))
    .orderBy(user.name)
}
