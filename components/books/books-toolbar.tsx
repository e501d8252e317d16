'use client'

import type { SortingState } from '@tanstack/react-table'
import { Search } from 'lucide-react'
import Link from 'next/link'
import { classNames } from '@/components/ui/class-names'
import { Input } from '@/components/ui/field'
import { Select } from '@/components/ui/select'

type BooksToolbarProps = {
  teamSlug: string
  isArchive: boolean
  search: string
  onSearch: (search: string) => void
  sorting: SortingState
  onSort: (sorting: SortingState) => void
}

/** For narrow screens, where the heads that sort are not drawn. */
const sortChoices = [
  { id: 'changedAt', label: 'Last change', desc: true },
  { id: 'name', label: 'Name', desc: false },
  { id: 'unknown', label: 'Still unknown', desc: true },
]

export function BooksToolbar({ teamSlug, isArchive, search, onSearch, sorting, onSort }: BooksToolbarProps) {
  return (
    <div className="mb-3 flex flex-wrap items-center gap-2.5">
      <div className="relative min-w-0 flex-1 basis-48 sm:max-w-80">
        <Search className="pointer-events-none absolute start-2.5 top-2.5 size-4 text-ink-3" aria-hidden="true" />
        <Input
          type="search"
          aria-label="Search books"
          placeholder="Search books"
          className="ps-8.5"
          value={search}
          onChange={(event) => onSearch(event.currentTarget.value)}
        />
      </div>
      <Select
        aria-label="Sort by"
        wrapperClassName="max-w-36 sm:hidden"
        value={sorting[0]?.id ?? ''}
        onChange={(event) => {
          const choice = sortChoices.find(({ id }) => id === event.currentTarget.value)
          if (choice) onSort([{ id: choice.id, desc: choice.desc }])
        }}
      >
        {sortChoices.map(({ id, label }) => (
          <option key={id} value={id}>
            {label}
          </option>
        ))}
      </Select>
      <nav aria-label="Which books" className="flex rounded-control border border-hair bg-rail p-0.5 sm:ms-auto">
        <WhichBooks href={`/${teamSlug}/books`} isCurrent={!isArchive}>
          In use
        </WhichBooks>
        <WhichBooks href={`/${teamSlug}/books?archived=1`} isCurrent={isArchive}>
          Archived
        </WhichBooks>
      </nav>
    </div>
  )
}

function WhichBooks({ href, isCurrent, children }: { href: string; isCurrent: boolean; children: string }) {
  return (
    <Link
      href={href}
      aria-current={isCurrent ? 'page' : undefined}
      className={classNames(
        'rounded-[6px] px-3 py-2 leading-none',
        isCurrent ? 'bg-sheet font-semibold shadow-sheet' : 'text-ink-2 hover:text-ink',
      )}
    >
      {children}
    </Link>
  )
}
