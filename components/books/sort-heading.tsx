import { ArrowDown, ArrowUp, ArrowUpDown } from 'lucide-react'
import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'

type SortHeadingProps = {
  sorted: false | 'asc' | 'desc'
  onSort: () => void
  className?: string
  children: ReactNode
}

/** A column's head that sorts by it; pressing again turns the order round. */
export function SortHeading({ sorted, onSort, className, children }: SortHeadingProps) {
  const Icon = sorted === 'asc' ? ArrowUp : sorted === 'desc' ? ArrowDown : ArrowUpDown
  return (
    <th
      scope="col"
      aria-sort={sorted === 'asc' ? 'ascending' : sorted === 'desc' ? 'descending' : undefined}
      className={classNames('border-b border-hair p-0 text-start font-normal', className)}
    >
      <button
        type="button"
        onClick={onSort}
        className={classNames(
          'flex h-9 w-full items-center gap-1.5 px-3 text-start -outline-offset-2 hover:text-ink',
          sorted ? 'font-semibold text-ink' : 'text-ink-2',
        )}
      >
        {children}
        <Icon className={classNames('size-3.5', !sorted && 'opacity-50')} aria-hidden="true" />
      </button>
    </th>
  )
}
