'use client'

import { useState } from 'react'
import { AskDialog } from '@/components/ui/ask-dialog'
import { ProjectChecks } from './project-checks'
import { roleWords } from './role-words'
import type { MemberRow, MembersActions, ProjectChoice } from './types'

type ProjectsDialogProps = {
  member: MemberRow
  projects: readonly ProjectChoice[]
  setMemberProjects: MembersActions['setMemberProjects']
  onDone: () => void
  onClose: () => void
}

/** Says which projects somebody belongs to. */
export function ProjectsDialog({ member, projects, setMemberProjects, onDone, onClose }: ProjectsDialogProps) {
  const before = member.projects === 'all' ? [] : member.projects.map(({ id }) => id)
  const [chosen, setChosen] = useState<string[]>(before)
  return (
    <AskDialog
      title={`Projects of ${member.name}`}
      verb="Keep this"
      action={() => setMemberProjects({ user: member.userId, projects: chosen })}
      onDone={onDone}
      onClose={onClose}
    >
      <p className="text-ink-2">
        {roleWords[member.role].who}: sees these projects and no others.
        {chosen.length === 0 ? ' With none, nothing of the team is seen.' : ''}
      </p>
      <ProjectChecks id="member-projects" projects={projects} chosen={chosen} onChange={setChosen} />
    </AskDialog>
  )
}
