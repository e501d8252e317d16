import type { Metadata } from 'next'
import { SampleBench } from '@/components/workbench/sample-bench'
import { fromProblem } from '@/lib/book/from-problem'
import { starters } from '@/lib/book/starters'

export const metadata: Metadata = { title: 'Sample book' }

export default function SamplePage() {
  const { problem } = starters.salt
  let next = 0
  // The page is made once for everyone: ids need only be unique within it.
  const records = fromProblem({ ...problem, name: 'Salt section' }, () => `sample-${++next}`)
  return (
    <main id="main" className="[--page-height:100dvh]">
      <SampleBench records={records} />
    </main>
  )
}
