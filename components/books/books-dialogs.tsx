'use client'

import { notify } from '@/components/ui/toast'
import type { Basis } from './flow-unit-select'
import { NameDialog } from './name-dialog'
import { NewBookDialog } from './new-book-dialog'
import type { BookRow, BooksActions, ProjectRow } from './types'

/** Which dialog is open, over what. */
export type OpenDialog =
  | { dialog: 'newBook'; projectId: string | undefined }
  | { dialog: 'duplicate'; book: BookRow }
  | { dialog: 'newProject' }
  | { dialog: 'renameProject'; project: ProjectRow }

type BooksDialogsProps = {
  open: OpenDialog | null
  projects: readonly ProjectRow[]
  flowUnits: Record<Basis, string>
  actions: BooksActions
  onBook: (book: { id: string }) => void
  onClose: () => void
}

export function BooksDialogs({ open, projects, flowUnits, actions, onBook, onClose }: BooksDialogsProps) {
  switch (open?.dialog) {
    case 'newBook':
      return (
        <NewBookDialog
          projects={projects}
          projectId={open.projectId}
          flowUnits={flowUnits}
          createBook={actions.createBook}
          onDone={onBook}
          onClose={onClose}
        />
      )
    case 'duplicate':
      return (
        <NameDialog
          title={`Duplicate ${open.book.name}`}
          description="The copy has the same components, streams, units and values, and a history of its own."
          label="Name of the copy"
          name={`${open.book.name}, copy`}
          verb="Duplicate"
          action={(name) => actions.duplicateBook({ book: open.book.id, name })}
          onDone={(name) => notify(`${name} is made.`)}
          onClose={onClose}
        />
      )
    case 'newProject':
      return (
        <NameDialog
          title="New project"
          description="A project stands for one client or plant and holds its books."
          label="Name"
          name=""
          verb="Make the project"
          action={(name) => actions.createProject({ name })}
          onDone={(name) => notify(`${name} is made.`)}
          onClose={onClose}
        />
      )
    case 'renameProject':
      return (
        <NameDialog
          title={`Rename ${open.project.name}`}
          label="New name"
          name={open.project.name}
          verb="Rename"
          action={(name) => actions.renameProject({ project: open.project.id, name })}
          onDone={(name) => notify(`The project is called ${name} now.`)}
          onClose={onClose}
        />
      )
    default:
      return null
  }
}
