'use client'

import { Button } from '@/components/ui/button'
import { isOutOfReach, type Reach, setOutOfReach } from '@/lib/book/cannot-measure'
import { newId } from '@/lib/book/ids'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'

const reaches: readonly Reach[] = ['flow', 'analysis']

/** What is marked as out of reach, with the way back. */
export function CannotList({ view, desk, onDone }: { view: BookView; desk: Desk; onDone: () => void }) {
  const marks = view.streams.flatMap((stream) =>
    reaches.filter((reach) => isOutOfReach(stream, reach)).map((reach) => ({ stream, reach })),
  )
  if (marks.length === 0) return null
  return (
    <section className="border-t border-hair px-4 py-3" aria-label="Cannot be measured">
      <h3 className="mb-1 font-semibold">Not asked for</h3>
      <ul className="grid gap-1">
        {marks.map(({ stream, reach }) => {
          const isFlow = reach === 'flow'
          return (
            <li key={`${stream.id} ${reach}`} className="flex flex-wrap items-center gap-x-3">
              {isFlow ? `The flow of ${stream.tag} cannot be measured.` : `${stream.tag} cannot be analysed.`}
              {view.mayEdit ? (
                <Button
                  size="small"
                  look="quiet"
                  onClick={() => {
                    if (desk.tryRun(setOutOfReach(view.state, stream.id, reach, false, newId))) onDone()
                  }}
                >
                  {isFlow ? `Flow of ${stream.tag} can be measured` : `${stream.tag} can be analysed`}
                </Button>
              ) : null}
            </li>
          )
        })}
      </ul>
    </section>
  )
}
