import type { Role } from '@/lib/auth/permissions'
import type { InvitationView } from '@/lib/data/invitation/list-invitations'
import type { MemberView } from '@/lib/data/member/list-members'
import type { Result } from '@/lib/errors'

export type MemberRow = MemberView
export type InvitationRow = InvitationView
export type ProjectChoice = { id: string; name: string }

/** What the page behind an invitation's link can have done. */
export type InvitationActions = {
  acceptInvitation: (input: { token: string }) => Promise<Result<{ team: string }>>
  signUpAndAccept: (input: {
    token: string
    name: string
    password: string
  }) => Promise<Result<{ team: string; email: string }>>
}

/** What an owner can have done with the people of a team; each is a server action bound to the team. */
export type MembersActions = {
  inviteMember: (input: { email: string; role: Role; projects: string[] }) => Promise<Result<unknown>>
  resendInvitation: (input: { invitation: string }) => Promise<Result<unknown>>
  revokeInvitation: (input: { invitation: string }) => Promise<Result<unknown>>
  changeRole: (input: { user: string; role: Role; projects?: string[] }) => Promise<Result<unknown>>
  setMemberProjects: (input: { user: string; projects: string[] }) => Promise<Result<unknown>>
  deactivateMember: (input: { user: string }) => Promise<Result<unknown>>
  reactivateMember: (input: { user: string }) => Promise<Result<unknown>>
  removeMember: (input: { user: string }) => Promise<Result<unknown>>
  leaveTeam: () => Promise<Result<unknown>>
}
