import { useState } from 'react'
import { usePanels } from '@/hooks/use-panels'
import type { Explanation } from '@/lib/balance'
import { toProblem } from '@/lib/book/to-problem'
import type { BookView } from '../book-view'
import type { Explained } from './explained'

export type ExplainedHandle = { explained: Explained | null; stale: boolean; trouble: string | null }

/** The workings of the newest answer while somebody looks; the last ones stay, with their problem, until newer ones come. */
export function useExplained(view: BookView, isWanted: boolean): ExplainedHandle {
  const { answer, stale, trouble } = usePanels('explain', isWanted ? {} : null)
  const [kept, setKept] = useState<{ of: Explanation; explained: Explained } | null>(null)
  if (answer && !stale && view.solved && kept?.of !== answer) {
    const { problem } = toProblem(view.state, view.caseId)
    setKept({ of: answer, explained: { problem, solved: view.solved, explanation: answer } })
  }
  return { explained: kept?.explained ?? null, stale: stale || kept?.of !== answer, trouble }
}
