'use client'

import { useState } from 'react'
import { AskDialog } from '@/components/ui/ask-dialog'
import { type Role, seesEveryProject } from '@/lib/auth/permissions'
import { ProjectChecks } from './project-checks'
import { lostActions } from './role-change'
import { aRole, roleSentence } from './role-words'
import type { MemberRow, MembersActions, ProjectChoice } from './types'

type RoleDialogProps = {
  member: MemberRow
  role: Role
  projects: readonly ProjectChoice[]
  changeRole: MembersActions['changeRole']
  onDone: () => void
  onClose: () => void
}

/** Asks before a change of role that takes something away, and for the projects of a role that needs them. */
export function RoleDialog({ member, role, projects, changeRole, onDone, onClose }: RoleDialogProps) {
  const before = member.projects === 'all' ? [] : member.projects.map(({ id }) => id)
  const [chosen, setChosen] = useState<string[]>(before)
  const needsProjects = !seesEveryProject(role)
  const loses = lostActions(member.role, role)
  const who = member.isYou ? 'you' : member.name
  return (
    <AskDialog
      title={`Make ${member.isYou ? 'yourself' : member.name} ${aRole(role)}?`}
      verb="Change the role"
      isDanger={loses.length > 0}
      action={() => changeRole({ user: member.userId, role, ...(needsProjects && { projects: chosen }) })}
      onDone={onDone}
      onClose={onClose}
    >
      <p>{roleSentence(role)}</p>
      {role === 'owner' ? (
        <p>{member.name} could then change everything here, and take the role of owner from you too.</p>
      ) : null}
      {loses.length > 0 ? <p>{lossSentence(member.role, role, who)}</p> : null}
      {needsProjects ? (
        <ProjectChecks id="role-projects" projects={projects} chosen={chosen} onChange={setChosen} />
      ) : null}
    </AskDialog>
  )
}

function lossSentence(from: Role, to: Role, who: string): string {
  const loses = lostActions(from, to)
  const lost = [
    loses.includes('member.changeRole') ? 'look after people, projects and settings' : null,
    loses.includes('book.edit') ? 'edit books' : null,
    loses.includes('book.read') ? 'read books that are not issued' : null,
  ].filter((words) => words !== null)
  const list = new Intl.ListFormat('en-GB', { type: 'disjunction' }).format(lost)
  return `From then on ${who} cannot ${list === '' ? 'do all that was possible before' : list} any more.`
}
