import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { invitation, member, projectMember } from '@/db/schema/team'
import { newId } from '@/lib/book/ids'
import { ok, type Result } from '@/lib/errors'
import { note } from './audit'
import { mayBeInvited, type OpenInvitation } from './invitations'

/** Makes a person a member of the team that an invitation, locked, is for; and the invitation is used up. */
export async function joinTeam(tx: Transaction, open: OpenInvitation, userId: string): Promise<Result<undefined>> {
  const { invitation: invited, team, projects } = open
  const allowed = await mayBeInvited(tx, team.id, invited.email)
  if (!allowed.ok) return allowed
  await tx.insert(member).values({ id: newId(), teamId: team.id, userId, role: invited.role })
  if (projects.length > 0)
    await tx.insert(projectMember).values(projects.map(({ id }) => ({ teamId: team.id, projectId: id, userId })))
  await spend(tx, open, userId)
  return ok()
}

export async function spend(
  tx: Transaction,
  { invitation: { id, email, role }, team }: OpenInvitation,
  userId: string,
) {
  await tx.update(invitation).set({ status: 'accepted', acceptedBy: userId }).where(eq(invitation.id, id))
  await note({ tx, team, userId }, 'invitation.accept', { kind: 'invitation', id }, { email, role })
}
