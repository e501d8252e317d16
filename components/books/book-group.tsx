import Link from 'next/link'
import type { ReactNode } from 'react'
import { Tag } from '@/components/ui/tag'
import { Progress } from './progress'
import type { BookRow, ProjectRow } from './types'
import { When } from './when'

type BookGroupProps = {
  teamSlug: string
  project: ProjectRow
  books: readonly BookRow[]
  isArchive: boolean
  bookActions: (book: BookRow) => ReactNode
  projectActions: (project: ProjectRow) => ReactNode
}

const edge = 'border-b border-hair align-top'
const cell = `${edge} px-3 py-2.5`

function LastChange({ book }: { book: BookRow }) {
  if (book.archivedAt)
    return (
      <>
        archived <When at={book.archivedAt} />
      </>
    )
  return (
    <>
      <When at={book.changedAt} />
      {book.changedBy ? ` by ${book.changedBy.name}` : null}
    </>
  )
}

function StateTag({ book }: { book: BookRow }) {
  return <Tag tone="draft">{book.archivedAt ? 'Archived' : 'Draft'}</Tag>
}

/** One project and its books. On a narrow screen a book is one cell that holds all. */
export function BookGroup({ teamSlug, project, books, isArchive, bookActions, projectActions }: BookGroupProps) {
  return (
    <tbody>
      <tr>
        <th
          scope="rowgroup"
          colSpan={5}
          className="border-b border-hair bg-paper py-1 ps-3 pe-2 text-start font-heading font-semibold"
        >
          <span className="flex min-h-8 items-center gap-2">
            <span className="min-w-0 truncate">{project.name}</span>
            <span className="font-sans text-sm font-normal text-ink-3">
              {books.length === 0 ? 'No book yet' : books.length === 1 ? '1 book' : `${books.length} books`}
            </span>
            <span className="ms-auto flex">{projectActions(project)}</span>
          </span>
        </th>
      </tr>
      {books.map((book) => (
        <tr key={book.id} className="group relative hover:bg-brook-wash">
          <th scope="row" className={`${cell} text-start font-normal max-sm:w-full`}>
            <BookName teamSlug={teamSlug} book={book} isArchive={isArchive} />
            <div className="mt-2 grid gap-2 sm:hidden">
              <Progress summary={book.summary} />
              <p className="flex flex-wrap items-center gap-x-2 gap-y-1 text-sm text-ink-2">
                <StateTag book={book} />
                <span>
                  <LastChange book={book} />
                </span>
              </p>
            </div>
          </th>
          <td className={`${cell} max-sm:hidden`}>
            <StateTag book={book} />
          </td>
          <td className={`${cell} max-sm:hidden`}>
            <Progress summary={book.summary} />
          </td>
          <td className={`${cell} text-ink-2 max-sm:hidden`}>
            <LastChange book={book} />
          </td>
          <td className={`${edge} relative z-[1] w-12 py-1.5 pe-2 text-end`}>{bookActions(book)}</td>
        </tr>
      ))}
    </tbody>
  )
}

function BookName({ teamSlug, book, isArchive }: { teamSlug: string; book: BookRow; isArchive: boolean }) {
  return (
    <>
      {isArchive ? (
        <span className="block text-md leading-tight wrap-anywhere">{book.name}</span>
      ) : (
        <Link
          href={`/${teamSlug}/books/${book.id}`}
          className="block text-md leading-tight font-semibold wrap-anywhere group-hover:text-brook after:absolute after:inset-0"
        >
          {book.name}
        </Link>
      )}
      {book.documentNumber ? <span className="block truncate text-sm text-ink-3">{book.documentNumber}</span> : null}
    </>
  )
}
