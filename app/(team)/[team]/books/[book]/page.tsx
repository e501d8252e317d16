import type { Metadata } from 'next'
import { cache } from 'react'
import { TeamBench } from '@/components/workbench/team-bench'
import { getBook } from '@/lib/data/book/get-book'
import { openTeam, requestContext, valueFor } from '../../open-team'

const readBook = cache(async (team: string, book: string) => getBook(await requestContext(), { book, team }))

export async function generateMetadata({ params }: PageProps<'/[team]/books/[book]'>): Promise<Metadata> {
  const { team, book } = await params
  const found = await readBook(team, book)
  const record = found.ok ? found.value.records.find(({ kind }) => kind === 'book') : undefined
  return { title: record?.kind === 'book' ? record.name : 'Book' }
}

export default async function BookPage({ params }: PageProps<'/[team]/books/[book]'>) {
  const { team: slug, book: bookId } = await params
  const path = `/${slug}/books/${bookId}`
  const { team } = await openTeam(slug, path)
  const book = valueFor(await readBook(slug, bookId), path)
  const { id, number, records, mayEdit, archived, role } = book
  const readOnly = archived
    ? 'This book is archived: restore it in the list of books to edit it.'
    : mayEdit
      ? null
      : `You can read this book; ${role}s do not edit it.`
  return (
    <main id="main">
      <TeamBench
        opened={{ id, userId: team.user.id, number, records, mayEdit }}
        crumb={{ label: book.project.name, href: `/${slug}/books` }}
        readOnly={readOnly}
        decimal={book.settings.decimal}
        closureLimit={book.settings.closureLimit}
        digits={{ flow: book.settings.flowDigits, fraction: book.settings.fractionDigits }}
      />
    </main>
  )
}
