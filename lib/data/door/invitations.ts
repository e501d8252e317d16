import { and, eq, isNotNull, sql } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { user } from '@/db/schema/account'
import { teamSettings } from '@/db/schema/settings'
import { invitation, invitationProject, project, team } from '@/db/schema/team'
import { hashOfToken, newToken } from '@/lib/auth/mailed-token'
import { isRole, type Role } from '@/lib/auth/permissions'
import { fail, ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { lockTeam } from './lock-team'
import type { Seat } from './seat'

const days = 7

export type InvitationRow = typeof invitation.$inferSelect
export type OpenInvitation = {
  invitation: InvitationRow & { role: Role }
  team: { id: string; slug: string; name: string }
  inviter: string
  projects: { id: string; name: string }[]
}

/** A new secret for an invitation, and until when it is good. */
export function freshToken(): { token: string; tokenHash: string; sentAt: Date; expiresAt: Date } {
  const token = newToken()
  const now = Date.now()
  return {
    token,
    tokenHash: hashOfToken(token),
    sentAt: new Date(now),
    expiresAt: new Date(now + days * 24 * 60 * 60 * 1000),
  }
}

type Invited = { email: string; role: Role; projects: string[]; token: string; expiresAt: Date }

/** The token stands behind the question mark: the path alone is what logs show. */
export async function mailInvitation({ tx, team: { id, name }, userId }: Seat, invited: Invited): Promise<void> {
  const [inviter] = await tx.select({ name: user.name }).from(user).where(eq(user.id, userId))
  const { email, role, projects, token, expiresAt } = invited
  const message = {
    kind: 'invitation',
    team: name,
    inviter: inviter?.name ?? '',
    role,
    projects,
    path: `/invitation?token=${token}`,
    until: expiresAt.toISOString(),
  } as const
  await enqueueMail(tx, { to: email, message, teamId: id })
}

/** Refuses an address that the team's list of mail domains does not hold. */
export async function mayBeInvited(tx: Transaction, teamId: string, email: string): Promise<Result<undefined>> {
  const mine = eq(teamSettings.teamId, teamId)
  const [settings] = await tx.select({ domains: teamSettings.mailDomains }).from(teamSettings).where(mine)
  const domains = settings?.domains ?? []
  const domain = email.slice(email.lastIndexOf('@') + 1)
  if (domains.length === 0 || domains.includes(domain)) return ok()
  const what = `ends in @${domain}; this team takes only ${domains.map((name) => `@${name}`).join(', ')}`
  return fail('notAllowed', `This address ${what}. An owner can change that in the settings of the team.`, {
    issues: [{ path: 'email', what }],
  })
}

/** One plain answer for each way in which a link can be of no use; nothing of the team is told. */
const useless = {
  wrong: () =>
    fail('notFound', 'This invitation link is not right, or a newer one was sent. Use the link in the newest mail.'),
  revoked: () => fail('notFound', 'This invitation was withdrawn. Ask whoever sent it.'),
  accepted: () => fail('conflict', 'This invitation has been accepted already. Sign in to go on.'),
  expired: () => fail('conflict', 'This invitation has run out. Ask whoever sent it for a new one.'),
}

/** What a mailed token opens. With `lock`, it stays so until the transaction ends, and its team is locked. */
export async function invitationOf(
  tx: Transaction,
  token: string,
  { lock = false }: { lock?: boolean } = {},
): Promise<Result<OpenInvitation>> {
  const ofToken = and(isNotNull(invitation.tokenHash), eq(invitation.tokenHash, hashOfToken(token)))
  if (lock) {
    // The team first, as those do who change it from within: so nobody waits in a circle.
    const [found] = await tx.select({ id: invitation.teamId }).from(invitation).where(ofToken)
    if (found) await lockTeam({ tx, team: found })
  }
  const [row] = await tx
    .select({ invitation, team: { id: team.id, slug: team.slug, name: team.name }, inviter: user.name })
    .from(invitation)
    .innerJoin(team, eq(team.id, invitation.teamId))
    .innerJoin(user, eq(user.id, invitation.inviterId))
    .where(ofToken)
  if (!row || !isRole(row.invitation.role)) return useless.wrong()
  if (row.invitation.status === 'accepted') return useless.accepted()
  if (row.invitation.status !== 'pending') return useless.revoked()
  if (row.invitation.expiresAt.getTime() <= Date.now()) return useless.expired()
  const projects = await projectsOfInvitation(tx, row.invitation.id)
  return ok({ ...row, projects })
}

export function projectsOfInvitation(tx: Transaction, id: string): Promise<{ id: string; name: string }[]> {
  return tx
    .select({ id: project.id, name: project.name })
    .from(invitationProject)
    .innerJoin(project, eq(project.id, invitationProject.projectId))
    .where(eq(invitationProject.invitationId, id))
    .orderBy(sql`${project.name}`)
}
