'use client'

import {
  columnFilteringFeature,
  createColumnHelper,
  createFilteredRowModel,
  createSortedRowModel,
  filterFn_includesString,
  globalFilteringFeature,
  rowSortingFeature,
  type SortingState,
  sortFn_basic,
  sortFn_text,
  tableFeatures,
  useTable,
} from '@tanstack/react-table'
import type { ReactNode } from 'react'
import { BookGroup } from './book-group'
import { SortHeading } from './sort-heading'
import type { BookRow, ProjectRow } from './types'

const features = tableFeatures({
  columnFilteringFeature,
  globalFilteringFeature,
  filteredRowModel: createFilteredRowModel(),
  filterFns: { includesString: filterFn_includesString },
  rowSortingFeature,
  sortedRowModel: createSortedRowModel(),
  sortFns: { text: sortFn_text, basic: sortFn_basic },
})

const helper = createColumnHelper<typeof features, BookRow>()
const columns = helper.columns([
  helper.accessor('name', { header: 'Book', sortFn: 'text' }),
  helper.accessor((book) => book.summary?.unknown, {
    id: 'unknown',
    header: 'Still unknown',
    sortFn: 'basic',
    sortUndefined: 'last',
    sortDescFirst: true,
    enableGlobalFilter: false,
  }),
  helper.accessor((book) => new Date(book.archivedAt ?? book.changedAt).getTime(), {
    id: 'changedAt',
    header: 'Last change',
    sortFn: 'basic',
    sortDescFirst: true,
    enableGlobalFilter: false,
  }),
  helper.accessor('projectName', { enableSorting: false }),
  helper.accessor('documentNumber', { enableSorting: false }),
  helper.accessor((book) => book.changedBy?.name ?? '', { id: 'changedBy', enableSorting: false }),
])
const searched = new Set(['name', 'projectName', 'documentNumber', 'changedBy'])

type BooksTableProps = {
  teamSlug: string
  books: BookRow[]
  projects: readonly ProjectRow[]
  search: string
  sorting: SortingState
  onSortingChange: (sorting: SortingState) => void
  isArchive: boolean
  bookActions: (book: BookRow) => ReactNode
  projectActions: (project: ProjectRow) => ReactNode
}

/** The books by project, sorted within each; projects without a match are left out while somebody searches. */
export function BooksTable(props: BooksTableProps) {
  const { books, projects, search, sorting, onSortingChange, isArchive } = props
  const table = useTable({
    features,
    columns,
    data: books,
    getRowId: (book) => book.id,
    state: { globalFilter: search, sorting },
    onSortingChange: (next) => onSortingChange(typeof next === 'function' ? next(sorting) : next),
    globalFilterFn: 'includesString',
    getColumnCanGlobalFilter: (column) => searched.has(column.id),
    enableSortingRemoval: false,
    enableMultiSort: false,
  })
  const rows = table.getRowModel().rows.map((row) => row.original)
  const groups = projects
    .map((project) => ({ project, rows: rows.filter((book) => book.projectId === project.id) }))
    .filter((group) => group.rows.length > 0 || (search.trim() === '' && !isArchive))

  const heading = (id: string, className?: string) => {
    const column = table.getColumn(id)
    if (!column) return null
    return (
      <SortHeading
        sorted={column.getIsSorted()}
        onSort={() => column.toggleSorting()}
        {...(className ? { className } : {})}
      >
        {String(column.columnDef.header)}
      </SortHeading>
    )
  }

  return (
    <>
      <p role="status" className="sr-only">
        {rows.length === 1 ? '1 book' : `${rows.length} books`}
      </p>
      {groups.length === 0 ? (
        <p className="px-5 py-10 text-ink-2">
          No book, document number, project or name of the last editor holds “{search.trim()}”.
        </p>
      ) : (
        <table className="w-full border-separate border-spacing-0 sm:table-fixed [&>tbody:last-child>tr:last-child>*]:border-b-0">
          <caption className="sr-only">{isArchive ? 'Archived books' : 'Books'}, by project</caption>
          <thead className="max-sm:sr-only">
            <tr className="bg-rail text-start">
              {heading('name', 'w-[36%]')}
              <th scope="col" className="w-[9%] min-w-24 border-b border-hair px-3 text-start font-normal text-ink-2">
                State
              </th>
              {heading('unknown', 'w-[26%]')}
              {heading('changedAt')}
              <th scope="col" className="w-12 border-b border-hair">
                <span className="sr-only">Actions</span>
              </th>
            </tr>
          </thead>
          {groups.map(({ project, rows: group }) => (
            <BookGroup
              key={project.id}
              teamSlug={props.teamSlug}
              project={project}
              books={group}
              isArchive={isArchive}
              bookActions={props.bookActions}
              projectActions={props.projectActions}
            />
          ))}
        </table>
      )}
    </>
  )
}
