import { and, eq, sql } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { isLastOwner, memberOf } from '../door/members'
import { lastOwner } from '../door/refusals'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, user: recordId })

/**
 * Lets somebody go: out of the team with their next request, since every verb looks who is in it. The name stays on what
 * they did. Their sessions are not ended: they belong to the account, which may be in other teams.
 */
export function deactivateMember(ctx: Context, given: z.input<typeof input>): Promise<Result<{ user: string }>> {
  return inLockedTeam(ctx, 'member.deactivate', input, given, async (seat, { user }) => {
    const { tx, team, userId } = seat
    const found = await memberOf(seat, user)
    if (!found.ok) return found
    const who = found.value
    if (who.deactivatedAt !== null) return fail('conflict', `${who.name} is deactivated already.`)
    if (await isLastOwner(seat, who)) return lastOwner()
    await tx
      .update(member)
      .set({ deactivatedAt: sql`now()` })
      .where(and(eq(member.teamId, team.id), eq(member.userId, user)))
    await note(seat, 'member.deactivate', { kind: 'member', id: user }, { name: who.name, role: who.role })
    if (user !== userId) {
      const message = { kind: 'membership', name: who.name, team: team.name, event: 'deactivated' } as const
      await enqueueMail(tx, { to: who.email, message, teamId: team.id })
    }
    return ok({ user })
  })
}
