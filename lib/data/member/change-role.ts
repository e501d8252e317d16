import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { seesEveryProject } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { isLastOwner, memberOf, projectsOfTeam, putInProjects } from '../door/members'
import { lastOwner } from '../door/refusals'
import { projectIds, recordId, role, teamSlug } from '../door/words'

/** `projects`: where an analyst or a reader belongs from now on; left out, as before. */
const input = z.strictObject({ team: teamSlug, user: recordId, role, projects: projectIds.optional() })

/** Gives somebody another role in a team. The last owner stays one. */
export function changeRole(ctx: Context, given: z.input<typeof input>): Promise<Result<{ user: string }>> {
  return inLockedTeam(ctx, 'member.changeRole', input, given, async (seat, { user, role, projects }) => {
    const { tx, team, userId } = seat
    const found = await memberOf(seat, user)
    if (!found.ok) return found
    const who = found.value
    if (role !== 'owner' && (await isLastOwner(seat, who))) return lastOwner()
    // A role that sees every project keeps no list: it would come back unasked with a later change.
    const belongsTo = seesEveryProject(role) ? [] : projects
    const names = await projectsOfTeam(seat, belongsTo ?? [])
    if (!names.ok) return names
    if (belongsTo) await putInProjects(seat, user, belongsTo)
    await tx
      .update(member)
      .set({ role })
      .where(and(eq(member.teamId, team.id), eq(member.userId, user)))
    const detail = { name: who.name, from: who.role, to: role, ...(belongsTo && { projects: names.value }) }
    await note(seat, 'member.changeRole', { kind: 'member', id: user }, detail)
    if (user !== userId && role !== who.role && who.deactivatedAt === null) {
      const message = { kind: 'roleChanged', name: who.name, team: team.name, role, path: `/${team.slug}` } as const
      await enqueueMail(tx, { to: who.email, message, teamId: team.id })
    }
    return ok({ user })
  })
}
