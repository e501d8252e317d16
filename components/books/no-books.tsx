import { Button } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import type { ProjectRow } from './types'

type NoBooksProps = {
  role: string
  isArchive: boolean
  projects: readonly ProjectRow[]
  may: { makeBooks: boolean; makeProjects: boolean; readBooks: boolean }
  onNewBook: () => void
  onNewProject: () => void
}

const joined = (projects: readonly ProjectRow[]) =>
  new Intl.ListFormat('en').format(projects.map((project) => project.name))

function YourProjects({ projects }: { projects: readonly ProjectRow[] }) {
  return projects.length > 0 ? (
    <p>You belong to {joined(projects)}.</p>
  ) : (
    <p>You belong to no project yet: the owner of the team adds you to those that concern you.</p>
  )
}

/** Why the list is empty, for whom, and what to do so that it is not. */
export function NoBooks({ role, isArchive, projects, may, onNewBook, onNewProject }: NoBooksProps) {
  if (!may.readBooks && role === 'analyst')
    return (
      <EmptyState title="Books are kept by the engineers">
        <p>
          An analyst edits no book. Sample requests and their results will stand in a room of their own, which this
          version does not have yet: nothing waits for you.
        </p>
        <YourProjects projects={projects} />
      </EmptyState>
    )
  if (!may.readBooks)
    return (
      <EmptyState title="No revision has been issued to you yet">
        <p>A book is shown here once a revision of it is checked and issued; so far all are drafts.</p>
        <YourProjects projects={projects} />
      </EmptyState>
    )
  if (isArchive)
    return (
      <EmptyState title="Nothing is archived">
        <p>
          A book that is no longer worked on can be archived from its menu in the list. It is kept, and can come back.
        </p>
      </EmptyState>
    )
  if (projects.length === 0)
    return (
      <EmptyState
        title="First a project, then its books"
        actions={
          may.makeProjects ? (
            <Button look="main" onClick={onNewProject}>
              New project
            </Button>
          ) : null
        }
      >
        <p>A project stands for one client or plant and holds its books.</p>
        {may.makeProjects ? null : <p>The owner of the team makes projects: ask them for one.</p>}
      </EmptyState>
    )
  return (
    <EmptyState
      title="No book yet"
      actions={
        may.makeBooks ? (
          <Button look="main" onClick={onNewBook}>
            New book
          </Button>
        ) : null
      }
    >
      <p>
        A book is one process section: its components, streams, units and connections, and what is known of them. Start
        with a blank one, or with an invented plant to see how a finished table looks.
      </p>
      {may.makeBooks ? null : <p>Engineers and the owner make books.</p>}
    </EmptyState>
  )
}
