'use client'

import { Button } from '@/components/ui/button'
import { setUse, type UsedRef, usedName } from '@/lib/book/edits/ways-out'
import { newId } from '@/lib/book/ids'
import { inOrder } from '@/lib/book/state'
import { type BookView, rowOfGiven } from '../book-view'
import type { Desk } from '../desk'
import { rowIdOf } from '../rows'
import { sentence } from '../words'

type Aside = { ref: UsedRef; use: 'check' | 'withdrawn'; typed: string }

/** Givens of this case and rules that stand but are not used. */
export function keptAside(view: BookView): Aside[] {
  const list: Aside[] = []
  const { state } = view
  for (const givens of view.givensAt.values())
    for (const { id, use, text } of givens)
      if (use !== 'given') list.push({ ref: { kind: 'given', id }, use, typed: `“${text}”` })
  for (const { id, use } of inOrder(state.rule))
    if (use !== 'given') list.push({ ref: { kind: 'rule', id }, use, typed: '' })
  return list
}

/** What was withdrawn or is kept as a check only, each with the way back into use. */
export function KeptAside({ view, desk, onDone }: { view: BookView; desk: Desk; onDone: () => void }) {
  const list = keptAside(view)
  if (list.length === 0) return null
  return (
    <section aria-label="Not used" className="pb-2">
      <h3 className="px-4 pt-2.5 pb-1 font-semibold">Not used</h3>
      <ul>
        {list.map(({ ref, use, typed }) => {
          const given = ref.kind === 'given' ? view.state.given.get(ref.id) : undefined
          const name = usedName(view.state, ref)
          return (
            <li key={`${ref.kind} ${ref.id}`} className="flex flex-wrap items-center gap-x-3 gap-y-1 px-4 py-1 text-sm">
              <span className={`cell-kept-${use} inline-block`} aria-hidden="true" />
              <span className="min-w-52 flex-1">
                {given ? (
                  <button
                    type="button"
                    className="link text-start"
                    onClick={() =>
                      desk.show('table', {
                        row: rowIdOf(rowOfGiven(given, view.book.basis)),
                        column: given.streamId,
                      })
                    }
                  >
                    {sentence(name)}
                  </button>
                ) : (
                  sentence(name)
                )}{' '}
                {typed} · {use === 'check' ? 'check only' : 'withdrawn'}
              </span>
              {view.mayEdit ? (
                <Button
                  size="small"
                  aria-label={`Use ${name} again`}
                  onClick={() => {
                    if (desk.tryRun(setUse(view.state, ref, 'given', newId))) onDone()
                  }}
                >
                  Use again
                </Button>
              ) : null}
            </li>
          )
        })}
      </ul>
    </section>
  )
}
