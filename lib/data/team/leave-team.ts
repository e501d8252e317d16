import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { isLastOwner, memberOf, putInProjects } from '../door/members'
import { lastOwner } from '../door/refusals'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

/** The caller leaves a team; the last owner cannot. To come back they have to be invited. */
export function leaveTeam(ctx: Context, given: z.input<typeof input>): Promise<Result<undefined>> {
  return inLockedTeam(ctx, 'team.leave', input, given, async (seat) => {
    const { tx, team, userId } = seat
    const me = await memberOf(seat, userId)
    if (!me.ok) return me
    if (await isLastOwner(seat, me.value)) return lastOwner()
    await putInProjects(seat, userId, [])
    await tx.delete(member).where(and(eq(member.teamId, team.id), eq(member.userId, userId)))
    const { name, role } = me.value
    await note(seat, 'team.leave', { kind: 'member', id: userId }, { name, role })
    return ok()
  })
}
