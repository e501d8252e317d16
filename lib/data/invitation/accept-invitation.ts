import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'
import { invitationOf } from '../door/invitations'
import { joinTeam, spend } from '../door/join-team'
import { signedOut } from '../door/refusals'
import { mailedToken } from '../door/words'

const input = z.strictObject({ token: mailedToken })

/** The caller, who has an account of the invited address, joins the team. Gives back its address. */
export function acceptInvitation(ctx: Context, given: z.input<typeof input>): Promise<Result<{ team: string }>> {
  return asPerson(ctx, input, given, async (tx, userId, { token }) => {
    const open = await invitationOf(tx, token, { lock: true })
    if (!open.ok) return open
    const { invitation, team } = open.value
    const [me] = await tx.select({ email: user.email }).from(user).where(eq(user.id, userId))
    if (!me) return signedOut()
    if (me.email !== invitation.email)
      return fail(
        'notAllowed',
        `This invitation is for ${invitation.email}, and you are signed in as ${me.email}. Sign out, and open the link again.`,
      )
    const mine = and(eq(member.teamId, team.id), eq(member.userId, userId))
    const [already] = await tx.select({ deactivatedAt: member.deactivatedAt }).from(member).where(mine)
    if (already?.deactivatedAt)
      return fail('notAllowed', 'Your membership in this team was deactivated. Ask an owner of it to reactivate it.')
    // In the team by another way meanwhile: nothing is lost, and the role stays as it is.
    if (already) await spend(tx, open.value, userId)
    else {
      const joined = await joinTeam(tx, open.value, userId)
      if (!joined.ok) return joined
    }
    return ok({ team: team.slug })
  })
}
