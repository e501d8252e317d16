'use client'

import type { SortingState } from '@tanstack/react-table'
import { Plus } from 'lucide-react'
import { useRouter } from 'next/navigation'
import { useDeferredValue, useState } from 'react'
import { Button } from '@/components/ui/button'
import { notify } from '@/components/ui/toast'
import { useAction } from '@/components/ui/use-action'
import { BookMenu } from './book-menu'
import { BooksDialogs, type OpenDialog } from './books-dialogs'
import { BooksTable } from './books-table'
import { BooksToolbar } from './books-toolbar'
import type { Basis } from './flow-unit-select'
import { NoBooks } from './no-books'
import { ProjectMenu } from './project-menu'
import type { BookRow, BooksActions, ProjectRow } from './types'

export type BooksViewProps = {
  team: { slug: string; name: string; role: string }
  books: BookRow[]
  projects: ProjectRow[]
  isArchive: boolean
  /** What to draw; the verbs decide again. */
  may: { readBooks: boolean; makeBooks: boolean; archiveBooks: boolean; makeProjects: boolean; renameProjects: boolean }
  /** What the team has chosen for new books. */
  flowUnits: Record<Basis, string>
  actions: BooksActions
}

/** The books of a team: search, sort, make, copy, put away and take out again. */
export function BooksView({ team, books, projects, isArchive, may, flowUnits, actions }: BooksViewProps) {
  const router = useRouter()
  const { run } = useAction()
  const [search, setSearch] = useState('')
  const [sorting, setSorting] = useState<SortingState>([{ id: 'changedAt', desc: true }])
  const [open, setOpen] = useState<OpenDialog | null>(null)
  const filter = useDeferredValue(search)
  const newBook = (projectId?: string) => setOpen({ dialog: 'newBook', projectId })
  const newProject = () => setOpen({ dialog: 'newProject' })

  const restore = (book: BookRow) =>
    run(
      () => actions.restoreBook({ book: book.id }),
      () => notify(`${book.name} is back in ${book.projectName}.`),
    )
  const archive = (book: BookRow) =>
    run(
      () => actions.archiveBook({ book: book.id }),
      () => notify(`${book.name} is archived.`, { label: 'Restore', onClick: () => restore(book) }),
    )

  // Several projects without books are still listed, so that a book can be made in the right one.
  const isEmpty = books.length === 0 && (isArchive || !may.readBooks || projects.length < 2)

  return (
    <>
      <header className="flex flex-wrap items-center gap-2 px-4 pt-4 pb-3 sm:px-6">
        <div className="me-auto min-w-0">
          <h1 className="text-[1.5rem] leading-tight">{isArchive ? 'Archived books' : 'Books'}</h1>
          <p className="truncate text-ink-2">{team.name}</p>
        </div>
        {may.makeProjects && !isArchive ? <Button onClick={newProject}>New project</Button> : null}
        {may.makeBooks && !isArchive && projects.length > 0 ? (
          <Button look="main" onClick={() => newBook()}>
            <Plus className="size-4" aria-hidden="true" />
            New book
          </Button>
        ) : null}
      </header>
      <div className="px-4 pb-10 sm:px-6">
        {may.readBooks ? (
          <BooksToolbar
            teamSlug={team.slug}
            isArchive={isArchive}
            search={search}
            onSearch={setSearch}
            sorting={sorting}
            onSort={setSorting}
          />
        ) : null}
        <div className="sheet overflow-hidden">
          {isEmpty ? (
            <NoBooks
              role={team.role}
              isArchive={isArchive}
              projects={projects}
              may={may}
              onNewBook={() => newBook()}
              onNewProject={newProject}
            />
          ) : (
            <BooksTable
              teamSlug={team.slug}
              books={books}
              projects={projects}
              search={filter}
              sorting={sorting}
              onSortingChange={setSorting}
              isArchive={isArchive}
              bookActions={(book) => (
                <BookMenu
                  book={book}
                  mayDuplicate={may.makeBooks}
                  mayArchive={may.archiveBooks}
                  onDuplicate={() => setOpen({ dialog: 'duplicate', book })}
                  onArchive={() => archive(book)}
                  onRestore={() => restore(book)}
                />
              )}
              projectActions={(project) => (
                <ProjectMenu
                  project={project}
                  onNewBook={may.makeBooks && !isArchive ? () => newBook(project.id) : null}
                  onRename={may.renameProjects ? () => setOpen({ dialog: 'renameProject', project }) : null}
                />
              )}
            />
          )}
        </div>
      </div>
      <BooksDialogs
        open={open}
        projects={projects}
        flowUnits={flowUnits}
        actions={actions}
        onBook={({ id }) => router.push(`/${team.slug}/books/${id}`)}
        onClose={() => setOpen(null)}
      />
    </>
  )
}
