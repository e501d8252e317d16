import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'

/** The row heads of the little table. */
export const label = 'border-e border-b border-hair px-2.5 text-start'

/** A heading over some rows. Its cell stands twice, since a narrow screen has no column of units. */
export function GroupRow({ children }: { children: ReactNode }) {
  return (
    <tr className="h-[23px] text-2xs text-ink-3">
      <GroupHead columns={6} className="sm:hidden">
        {children}
      </GroupHead>
      <GroupHead columns={7} className="max-sm:hidden">
        {children}
      </GroupHead>
    </tr>
  )
}

function GroupHead({ columns, className, children }: { columns: number; className: string; children: ReactNode }) {
  return (
    <th
      scope="colgroup"
      colSpan={columns}
      className={classNames('border-b border-hair bg-paper px-2.5 text-start font-normal', className)}
    >
      {children}
    </th>
  )
}
