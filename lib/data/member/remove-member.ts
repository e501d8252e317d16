import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { isLastOwner, memberOf, putInProjects } from '../door/members'
import { lastOwner } from '../door/refusals'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, user: recordId })

/** Takes somebody out of a team for good: to come back they have to be invited. The name stays on what they did. */
export function removeMember(ctx: Context, given: z.input<typeof input>): Promise<Result<{ user: string }>> {
  return inLockedTeam(ctx, 'member.remove', input, given, async (seat, { user }) => {
    const { tx, team, userId } = seat
    const found = await memberOf(seat, user)
    if (!found.ok) return found
    const who = found.value
    if (await isLastOwner(seat, who)) return lastOwner()
    await putInProjects(seat, user, [])
    await tx.delete(member).where(and(eq(member.teamId, team.id), eq(member.userId, user)))
    await note(seat, 'member.remove', { kind: 'member', id: user }, { name: who.name, role: who.role })
    if (user !== userId) {
      const message = { kind: 'membership', name: who.name, team: team.name, event: 'removed' } as const
      await enqueueMail(tx, { to: who.email, message, teamId: team.id })
    }
    return ok({ user })
  })
}
