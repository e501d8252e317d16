import type { Metadata } from 'next'
import { BooksView } from '@/components/books/books-view'
import { Caution } from '@/components/ui/caution'
import { mayDo } from '@/lib/auth/permissions'
import { listBooks } from '@/lib/data/book/list-books'
import { listProjects } from '@/lib/data/project/list-projects'
import { getTeamSettings } from '@/lib/data/settings/get-team-settings'
import { openTeam, valueFor } from '../open-team'
import { archiveBook, createBook, createProject, duplicateBook, renameProject, restoreBook } from './actions'

export const metadata: Metadata = { title: 'Books' }

export default async function BooksPage({ params, searchParams }: PageProps<'/[team]/books'>) {
  const { team: slug } = await params
  const isArchive = (await searchParams).archived === '1'
  const path = `/${slug}/books${isArchive ? '?archived=1' : ''}`
  const { ctx, team } = await openTeam(slug, path)
  const [projects, books, settings] = await Promise.all([
    listProjects(ctx, { team: slug }),
    listBooks(ctx, { team: slug, archived: isArchive }),
    getTeamSettings(ctx, { team: slug }),
  ])
  const { massFlowUnit: mass, moleFlowUnit: mole } = valueFor(settings, path)
  return (
    <div className="mx-auto flex min-h-(--page-height) max-w-[1240px] flex-col">
      <main id="main" className="flex-1">
        <BooksView
          team={{ slug, name: team.name, role: team.role }}
          projects={valueFor(projects, path)}
          books={valueFor(books, path)}
          isArchive={isArchive}
          may={{
            readBooks: mayDo(team.role, 'book.read'),
            makeBooks: mayDo(team.role, 'book.create'),
            archiveBooks: mayDo(team.role, 'book.archive'),
            makeProjects: mayDo(team.role, 'project.create'),
            renameProjects: mayDo(team.role, 'project.rename'),
          }}
          flowUnits={{ mass, mole }}
          actions={{
            createBook: createBook.bind(null, slug),
            duplicateBook: duplicateBook.bind(null, slug),
            archiveBook: archiveBook.bind(null, slug),
            restoreBook: restoreBook.bind(null, slug),
            createProject: createProject.bind(null, slug),
            renameProject: renameProject.bind(null, slug),
          }}
        />
      </main>
      <footer className="px-4 pb-4 sm:px-6">
        <Caution />
      </footer>
    </div>
  )
}
