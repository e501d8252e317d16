import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { memberOf } from '../door/members'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, user: recordId })

/** Lets somebody back in who was let go, with the role and the projects they had. */
export function reactivateMember(ctx: Context, given: z.input<typeof input>): Promise<Result<{ user: string }>> {
  return inLockedTeam(ctx, 'member.reactivate', input, given, async (seat, { user }) => {
    const { tx, team } = seat
    const found = await memberOf(seat, user)
    if (!found.ok) return found
    const who = found.value
    if (who.deactivatedAt === null) return fail('conflict', `${who.name} is in this team already.`)
    await tx
      .update(member)
      .set({ deactivatedAt: null })
      .where(and(eq(member.teamId, team.id), eq(member.userId, user)))
    await note(seat, 'member.reactivate', { kind: 'member', id: user }, { name: who.name, role: who.role })
    const message = { kind: 'membership', name: who.name, team: team.name, event: 'reactivated' } as const
    await enqueueMail(tx, { to: who.email, message, teamId: team.id })
    return ok({ user })
  })
}
