import { and, desc, eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import { invitation, invitationProject, project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

export type InvitationView = {
  id: string
  email: string
  role: Role
  projects: { id: string; name: string }[]
  inviter: string
  /** Of the newest mail. */
  sentAt: Date
  expiresAt: Date
  hasExpired: boolean
}

/** The invitations that nobody has accepted yet, the newest first; also those that have run out and can be sent again. */
export function listInvitations(ctx: Context, given: z.input<typeof input>): Promise<Result<InvitationView[]>> {
  return inTeam(
    ctx,
    'invitation.list',
    input,
    given,
    async ({ tx, team }) => {
      const pending = and(eq(invitation.teamId, team.id), eq(invitation.status, 'pending'))
      const { id, email, role, sentAt, expiresAt } = invitation
      const rows = await tx
        .select({ id, email, role, inviter: user.name, sentAt, expiresAt })
        .from(invitation)
        .innerJoin(user, eq(user.id, invitation.inviterId))
        .where(pending)
        .orderBy(desc(sentAt), desc(id))
      const belongings = await tx
        .select({ invitationId: invitationProject.invitationId, id: project.id, name: project.name })
        .from(invitationProject)
        .innerJoin(project, eq(project.id, invitationProject.projectId))
        .where(eq(invitationProject.teamId, team.id))
        .orderBy(project.name)
      const projectsOf = (invited: string) =>
        belongings.filter((row) => row.invitationId === invited).map(({ id, name }) => ({ id, name }))
      const now = Date.now()
      return ok(
        rows.map((row) => ({ ...row, projects: projectsOf(row.id), hasExpired: row.expiresAt.getTime() <= now })),
      )
    },
    { readOnly: true },
  )
}
