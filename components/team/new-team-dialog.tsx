'use client'

import { NameDialog } from '@/components/books/name-dialog'
import type { Result } from '@/lib/errors'

/** What somebody can have done with teams from anywhere; each is a server action. */
export type TeamActions = {
  createTeam: (input: { name: string }) => Promise<Result<{ slug: string }>>
  leaveTeam: () => Promise<Result<unknown>>
}

type NewTeamDialogProps = { createTeam: TeamActions['createTeam']; onClose: () => void }

/** Asks for the name of another team and goes there. */
export function NewTeamDialog({ createTeam, onClose }: NewTeamDialogProps) {
  return (
    <NameDialog
      title="New team"
      description="A team has its own people, projects and books. You own it, and invite others."
      label="Name"
      name=""
      verb="Make the team"
      action={(name) => createTeam({ name })}
      // A whole page load, so that the menus know of it.
      onDone={(_, { slug }) => window.location.assign(`/${slug}/books`)}
      onClose={onClose}
    />
  )
}
