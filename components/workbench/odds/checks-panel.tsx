'use client'

import { Check, TriangleAlert } from 'lucide-react'
import type { BookView } from '../book-view'
import { MemberName } from '../card/conflict-list'
import type { Desk } from '../desk'
import { type CheckLine, checkLines } from './checks'

/** What the balance does not need, held against the rest: agreed within its rounding or not, with the places. */
export function ChecksPanel({ view, desk }: { view: BookView; desk: Desk }) {
  const lines = checkLines(view)
  if (lines.length === 0)
    return (
      <p className="max-w-2xl px-4 py-3 text-ink-2">
        Nothing to check yet. A check is what the balance does not need: fractions that are all typed, a value that also
        follows from others, or one that is kept as a check only.
      </p>
    )
  return (
    <ul className="divide-y divide-hair" aria-label="Checks">
      {lines.map((line) => (
        <li key={line.key} className="px-4 py-2">
          <CheckText line={line} />
          {line.members.length > 0 ? (
            <p className="ms-6 flex flex-wrap gap-x-3 text-sm">
              {line.members.map((member) => (
                <MemberName key={member.key} desk={desk} member={member} />
              ))}
            </p>
          ) : null}
        </li>
      ))}
    </ul>
  )
}

/** One check in a sentence, its verdict in words and by a mark. */
export function CheckText({ line }: { line: CheckLine }) {
  return (
    <p className="flex items-start gap-2">
      {line.agrees ? (
        <Check className="mt-0.5 size-4 flex-none text-solved-edge" aria-hidden="true" />
      ) : (
        <TriangleAlert className="mt-0.5 size-4 flex-none text-odds-edge" aria-hidden="true" />
      )}
      <span>
        {line.what}: <strong className="font-semibold">{line.agrees ? 'agrees' : 'does not agree'}</strong>, {line.by}.
      </span>
    </p>
  )
}
