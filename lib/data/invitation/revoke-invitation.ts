import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { invitation } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { noSuchInvitation } from '../door/refusals'
import { recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, invitation: recordId })

/** Withdraws an invitation that nobody has accepted: its link opens nothing any more. */
export function revokeInvitation(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return inLockedTeam(ctx, 'invitation.revoke', input, given, async (seat, { invitation: id }) => {
    const wanted = and(eq(invitation.teamId, seat.team.id), eq(invitation.id, id), eq(invitation.status, 'pending'))
    const [done] = await seat.tx
      .update(invitation)
      .set({ status: 'canceled' })
      .where(wanted)
      .returning({ email: invitation.email, role: invitation.role })
    if (!done) return noSuchInvitation()
    await note(seat, 'invitation.revoke', { kind: 'invitation', id }, done)
    return ok({ id })
  })
}
