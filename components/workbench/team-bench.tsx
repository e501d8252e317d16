'use client'

import { useState } from 'react'
import { notifyProblem } from '@/components/ui/toast'
import { type OpenedBook, useBook } from '@/hooks/use-book'
import { usePanelsWorker } from '@/hooks/use-panels'
import { useSolver } from '@/hooks/use-solver'
import { inOrder } from '@/lib/book/state'
import type { Digits } from './book-view'
import type { DecimalChoice } from './use-reader'
import { Workbench } from './workbench'

type TeamBenchProps = {
  opened: OpenedBook
  crumb: { label: string; href: string }
  readOnly: string | null
  decimal: DecimalChoice
  digits: Digits
  /** Per cent. */
  closureLimit: number
}

/** A book kept on the server, at work. */
export function TeamBench({ opened, crumb, readOnly, decimal, digits, closureLimit }: TeamBenchProps) {
  const book = useBook(opened, notifyProblem)
  const [caseId] = useState(() => inOrder(book.state.case)[0]?.id ?? '')
  const solver = useSolver(book.state, caseId)
  const panels = usePanelsWorker(book.state, caseId, solver)
  return (
    <Workbench
      book={book}
      solver={solver}
      panels={panels}
      caseId={caseId}
      decimal={decimal}
      digits={digits}
      closureLimit={closureLimit}
      crumb={crumb}
      downloadHref={`/api/books/${opened.id}/table.xlsx`}
      {...(readOnly === null ? {} : { readOnly })}
    />
  )
}
