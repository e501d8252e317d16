import { and, count, eq, gt, sql } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { invitation, invitationProject, member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { seesEveryProject } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { freshToken, mailInvitation, mayBeInvited } from '../door/invitations'
import { projectsOfTeam } from '../door/members'
import type { Seat } from '../door/seat'
import { mailAddress, projectIds, role, teamSlug } from '../door/words'

/** `projects`: for an analyst or a reader, who see no others; of no meaning for the other roles. */
const input = z
  .strictObject({ team: teamSlug, email: mailAddress, role, projects: projectIds.default([]) })
  .refine((invited) => seesEveryProject(invited.role) || invited.projects.length > 0, {
    path: ['projects'],
    message: 'needs at least one project: this role sees no others',
  })

/** Mails that a stranger to us gets in a team's name: a team that invites more people in a day asks us first. */
const mostInADay = 200

/** Invites somebody by mail. The link in it is good for seven days; the mail goes out if and only if this is kept. */
export function inviteMember(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ id: string; expiresAt: Date }>> {
  return inLockedTeam(ctx, 'invitation.invite', input, given, async (seat, { email, role, projects }) => {
    const { tx, team, userId } = seat
    const refused = await whyNot(seat, email)
    if (refused) return refused
    const ids = seesEveryProject(role) ? [] : projects
    const names = await projectsOfTeam(seat, ids)
    if (!names.ok) return names
    const { token, ...fresh } = freshToken()
    const id = newId()
    await tx.insert(invitation).values({ id, teamId: team.id, email, role, inviterId: userId, ...fresh })
    if (ids.length > 0)
      await tx
        .insert(invitationProject)
        .values(ids.map((projectId) => ({ teamId: team.id, invitationId: id, projectId })))
    const { expiresAt } = fresh
    await mailInvitation(seat, { email, role, projects: names.value, token, expiresAt })
    await note(seat, 'invitation.invite', { kind: 'invitation', id }, { email, role, projects: names.value })
    return ok({ id, expiresAt })
  })
}

/** The refusal, where this address cannot be invited now; an invitation of it that has run out makes way. */
async function whyNot({ tx, team }: Seat, email: string) {
  const allowed = await mayBeInvited(tx, team.id, email)
  if (!allowed.ok) return allowed
  const [already] = await tx
    .select({ name: user.name, deactivatedAt: member.deactivatedAt })
    .from(member)
    .innerJoin(user, eq(user.id, member.userId))
    .where(and(eq(member.teamId, team.id), eq(user.email, email)))
  if (already?.deactivatedAt)
    return fail('conflict', `${already.name} (${email}) was in this team and is deactivated: reactivate them instead.`)
  if (already) return fail('conflict', `${already.name} (${email}) is in this team already.`)
  const ofTeam = eq(invitation.teamId, team.id)
  const today = gt(invitation.createdAt, sql`now() - interval '1 day'`)
  const [sent] = await tx.select({ today: count() }).from(invitation).where(and(ofTeam, today))
  if ((sent?.today ?? 0) >= mostInADay)
    return fail('tooMany', `This team has invited ${mostInADay} people within a day. Go on tomorrow.`)
  const pending = and(ofTeam, eq(invitation.email, email), eq(invitation.status, 'pending'))
  const [open] = await tx.select({ expiresAt: invitation.expiresAt }).from(invitation).where(pending)
  if (open && open.expiresAt.getTime() > Date.now())
    return fail('conflict', `${email} is invited already. Send that invitation again, or withdraw it first.`)
  if (open) await tx.update(invitation).set({ status: 'canceled' }).where(pending)
  return undefined
}
