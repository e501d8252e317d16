'use client'

import { AskDialog } from '@/components/ui/ask-dialog'
import { notify } from '@/components/ui/toast'
import type { Role } from '@/lib/auth/permissions'
import { ProjectsDialog } from './projects-dialog'
import { RoleDialog } from './role-dialog'
import { aRole } from './role-words'
import type { MemberRow, MembersActions, ProjectChoice } from './types'

/** Which question is open, about whom. */
export type MemberDialog =
  | { dialog: 'role'; member: MemberRow; role: Role }
  | { dialog: 'projects' | 'deactivate' | 'reactivate' | 'remove' | 'leave'; member: MemberRow }

type MemberDialogsProps = {
  open: MemberDialog | null
  teamName: string
  projects: readonly ProjectChoice[]
  actions: MembersActions
  onClose: () => void
}

export function MemberDialogs({ open, teamName, projects, actions, onClose }: MemberDialogsProps) {
  if (!open) return null
  const { member } = open
  const { name, userId: user } = member
  switch (open.dialog) {
    case 'role':
      return (
        <RoleDialog
          member={member}
          role={open.role}
          projects={projects}
          changeRole={actions.changeRole}
          onDone={() => notify(`${name} is ${aRole(open.role)} now.`)}
          onClose={onClose}
        />
      )
    case 'projects':
      return (
        <ProjectsDialog
          member={member}
          projects={projects}
          setMemberProjects={actions.setMemberProjects}
          onDone={() => notify(`The projects of ${name} are changed.`)}
          onClose={onClose}
        />
      )
    case 'deactivate':
      return (
        <AskDialog
          title={`Deactivate ${name}?`}
          verb="Deactivate"
          isDanger
          action={() => actions.deactivateMember({ user })}
          onDone={() => notify(`${name} is out of the team.`)}
          onClose={onClose}
        >
          <p>
            {name} is out of {teamName} within seconds, also where a book is open. What they did keeps their name, and
            you can let them in again as {aRole(member.role)}.
          </p>
        </AskDialog>
      )
    case 'reactivate':
      return (
        <AskDialog
          title={`Reactivate ${name}?`}
          verb="Reactivate"
          action={() => actions.reactivateMember({ user })}
          onDone={() => notify(`${name} is in the team again.`)}
          onClose={onClose}
        >
          <p>
            {name} comes back to {teamName} as {aRole(member.role)}, with the same projects as before.
          </p>
        </AskDialog>
      )
    case 'remove':
      return (
        <AskDialog
          title={`Remove ${name} from the team?`}
          verb="Remove"
          isDanger
          action={() => actions.removeMember({ user })}
          onDone={() => notify(`${name} is removed from the team.`)}
          onClose={onClose}
        >
          <p>
            {name} is taken off this list. What they did keeps their name; to come back they have to be invited again.
          </p>
        </AskDialog>
      )
    case 'leave':
      return <LeaveDialog teamName={teamName} leaveTeam={actions.leaveTeam} onClose={onClose} />
  }
}

type LeaveDialogProps = { teamName: string; leaveTeam: MembersActions['leaveTeam']; onClose: () => void }

/** Asks before somebody leaves a team of their own accord. */
export function LeaveDialog({ teamName, leaveTeam, onClose }: LeaveDialogProps) {
  return (
    <AskDialog
      title={`Leave ${teamName}?`}
      verb="Leave the team"
      isDanger
      action={leaveTeam}
      // A whole page load: nothing of the team stays in the router's cache.
      onDone={() => window.location.assign('/home')}
      onClose={onClose}
    >
      <p>You are out at once. What you did keeps your name; to come back you have to be invited again.</p>
    </AskDialog>
  )
}
