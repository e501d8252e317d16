'use client'

import { Button } from '@/components/ui/button'
import { setUse } from '@/lib/book/edits/ways-out'
import { newId } from '@/lib/book/ids'
import { type BookView, rowUnit } from '../book-view'
import { type Reading, typedNumber } from '../cell-reading'
import type { Desk } from '../desk'
import { backToCell } from '../regions'
import type { RowPlace } from '../rows'
import { CardSection } from './card-parts'

type NotUsedProps = { view: BookView; desk: Desk; row: RowPlace; reading: Reading }

const says = {
  check: 'It is kept as a check only: shown, not used.',
  withdrawn: 'It is withdrawn: kept, not used.',
  difference: 'This component is by difference in this stream, so what is typed is not used.',
}

/** What stands typed in a cell that does not use it, and the way back. */
export function NotUsed({ view, desk, row, reading }: NotUsedProps) {
  const { given, kept } = reading
  if (!given || !kept) return null
  const typed = typedNumber(view, row, given)
  return (
    <CardSection title="Typed, not used">
      <p className="text-sm">
        <span className={`cell-kept-${kept} me-1.5 inline-block`} aria-hidden="true" />
        {typed === null ? `“${given.text}”` : `${typed} ${rowUnit(view, row).shown}`}. {says[kept]}
      </p>
      {view.mayEdit && kept !== 'difference' ? (
        <Button
          size="small"
          className="mt-2"
          onClick={() => {
            if (desk.tryRun(setUse(view.state, { kind: 'given', id: given.id }, 'given', newId))) backToCell('table')
          }}
        >
          Use it again
        </Button>
      ) : null}
    </CardSection>
  )
}
