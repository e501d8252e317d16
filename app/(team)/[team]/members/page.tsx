import type { Metadata } from 'next'
import { MembersView } from '@/components/members/members-view'
import { TeamRoom } from '@/components/settings/team-room'
import { mayDo } from '@/lib/auth/permissions'
import { listInvitations } from '@/lib/data/invitation/list-invitations'
import { listMembers } from '@/lib/data/member/list-members'
import { listProjects } from '@/lib/data/project/list-projects'
import { leaveTeam } from '../actions'
import { openTeam, valueFor } from '../open-team'
import * as actions from './actions'

export const metadata: Metadata = { title: 'People' }

export default async function MembersPage({ params }: PageProps<'/[team]/members'>) {
  const { team: slug } = await params
  const path = `/${slug}/members`
  const { ctx, team } = await openTeam(slug, path)
  const mayInvite = mayDo(team.role, 'invitation.list')
  const [members, projects, invitations] = await Promise.all([
    listMembers(ctx, { team: slug }),
    listProjects(ctx, { team: slug }),
    mayInvite ? listInvitations(ctx, { team: slug }) : null,
  ])
  return (
    <TeamRoom team={team} room="members">
      <MembersView
        teamName={team.name}
        members={valueFor(members, path)}
        projects={valueFor(projects, path).map(({ id, name }) => ({ id, name }))}
        invitations={invitations && valueFor(invitations, path)}
        mayChange={mayDo(team.role, 'member.changeRole')}
        actions={{
          inviteMember: actions.inviteMember.bind(null, slug),
          resendInvitation: actions.resendInvitation.bind(null, slug),
          revokeInvitation: actions.revokeInvitation.bind(null, slug),
          changeRole: actions.changeRole.bind(null, slug),
          setMemberProjects: actions.setMemberProjects.bind(null, slug),
          deactivateMember: actions.deactivateMember.bind(null, slug),
          reactivateMember: actions.reactivateMember.bind(null, slug),
          removeMember: actions.removeMember.bind(null, slug),
          leaveTeam: leaveTeam.bind(null, slug),
        }}
      />
    </TeamRoom>
  )
}
