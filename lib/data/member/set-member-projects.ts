import { z } from 'zod'
import type { Context } from '@/lib/auth/context'
import { seesEveryProject } from '@/lib/auth/permissions'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { memberOf, projectsOfTeam, putInProjects } from '../door/members'
import { projectIds, recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, user: recordId, projects: projectIds })

/** Says which projects an analyst or a reader belongs to: these, and no others. */
export function setMemberProjects(ctx: Context, given: z.input<typeof input>): Promise<Result<{ user: string }>> {
  return inLockedTeam(ctx, 'member.setProjects', input, given, async (seat, { user, projects }) => {
    const found = await memberOf(seat, user)
    if (!found.ok) return found
    const { name, role } = found.value
    if (seesEveryProject(role)) return fail('conflict', `${name} is ${role} here and sees every project.`)
    const names = await projectsOfTeam(seat, projects)
    if (!names.ok) return names
    await putInProjects(seat, user, projects)
    await note(seat, 'member.setProjects', { kind: 'member', id: user }, { name, projects: names.value })
    return ok({ user })
  })
}
