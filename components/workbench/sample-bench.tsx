'use client'

import Link from 'next/link'
import { useState } from 'react'
import { buttonClasses } from '@/components/ui/button'
import { notifyProblem } from '@/components/ui/toast'
import { useLocalBook } from '@/hooks/use-local-book'
import { usePanelsWorker } from '@/hooks/use-panels'
import { useSolver } from '@/hooks/use-solver'
import type { BookRecord } from '@/lib/book/kinds'
import { inOrder } from '@/lib/book/state'
import { Workbench } from './workbench'

/** The sample book: no account, nothing leaves the browser. */
export function SampleBench({ records }: { records: readonly BookRecord[] }) {
  const book = useLocalBook(records, notifyProblem)
  const [caseId] = useState(() => inOrder(book.state.case)[0]?.id ?? '')
  const solver = useSolver(book.state, caseId)
  const panels = usePanelsWorker(book.state, caseId, solver)
  return (
    <Workbench
      book={book}
      solver={solver}
      panels={panels}
      caseId={caseId}
      crumb={{ label: 'Tallybrook', href: '/' }}
      kept="In this page only"
      headerEnd={
        <Link href="/sign-up" className={buttonClasses('main')}>
          Sign up to keep books
        </Link>
      }
    />
  )
}
