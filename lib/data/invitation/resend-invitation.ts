import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { invitation } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { freshToken, mailInvitation, mayBeInvited, projectsOfInvitation } from '../door/invitations'
import { noSuchInvitation } from '../door/refusals'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, invitation: recordId })

const waitSeconds = 60

/** Sends an invitation again, with a new link and seven days from now, also after it ran out. The former link ends. */
export function resendInvitation(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ id: string; expiresAt: Date }>> {
  return inLockedTeam(ctx, 'invitation.resend', input, given, async (seat, { invitation: id }) => {
    const { tx, team, userId } = seat
    const wanted = and(eq(invitation.teamId, team.id), eq(invitation.id, id), eq(invitation.status, 'pending'))
    const [found] = await tx.select().from(invitation).where(wanted)
    if (!found) return noSuchInvitation()
    const { email, role } = found
    if (Date.now() - found.sentAt.getTime() < waitSeconds * 1000)
      return fail('tooMany', `The mail to ${email} has just been sent. Wait a minute before you send it again.`)
    const allowed = await mayBeInvited(tx, team.id, email)
    if (!allowed.ok) return allowed
    const { token, ...fresh } = freshToken()
    await tx
      .update(invitation)
      .set({ ...fresh, inviterId: userId })
      .where(wanted)
    const projects = (await projectsOfInvitation(tx, id)).map(({ name }) => name)
    await mailInvitation(seat, { email, role, projects, token, expiresAt: fresh.expiresAt })
    await note(seat, 'invitation.resend', { kind: 'invitation', id }, { email, role })
    return ok({ id, expiresAt: fresh.expiresAt })
  })
}
