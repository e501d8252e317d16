'use client'

import { listed } from '@/lib/book/edits/draft'
import type { RecordOf } from '@/lib/book/kinds'
import type { BookView } from '../book-view'
import { isDoubtful, noteWords, type Reading } from '../cell-reading'
import type { Desk } from '../desk'
import { checkLines } from '../odds/checks'
import { CheckText } from '../odds/checks-panel'
import { givenMember } from '../odds/odds-sets'
import { CardSection } from './card-parts'

type CellNotesProps = { view: BookView; desk: Desk; stream: RecordOf<'stream'>; row: string; reading: Reading }

/** What the solver has to say about one cell, in plain sentences: doubts, what holds it back, several solutions, checks. */
export function CellNotes({ view, desk, stream, row, reading }: CellNotesProps) {
  const { reason, slot, flags } = reading
  const solution = view.solved?.solution
  const amplification = solution?.amplification.find(([at]) => at === slot)?.[1]
  const blocked = reading.state === 'unknown' ? (solution?.blockedBy.find(([at]) => at === slot)?.[1] ?? []) : []
  const words = noteWords(view, flags, amplification, reading.value !== null)
  const roots = rootsOf(view, stream, row)
  const checks = checkLines(view).filter(({ members }) =>
    members.some(({ place }) => place?.row === row && place.column === stream.id),
  )
  const isTrouble = reason !== null || isDoubtful(flags)
  return (
    <>
      {reason || words.length > 0 ? (
        <div className={`mt-3 grid gap-1 rounded-control px-3 py-2 text-sm ${isTrouble ? 'bg-odds' : 'bg-rail'}`}>
          {reason ? <p>{reason}</p> : null}
          {words.map((word) => (
            <p key={word}>{word}</p>
          ))}
        </div>
      ) : null}
      {blocked.length > 0 ? (
        <div className="mt-3 grid gap-1 rounded-control bg-rail px-3 py-2 text-sm">
          <p>
            Held back by {blocked.length === 1 ? 'conflict' : 'conflicts'}{' '}
            {listed(
              blocked.map((index) => String(index + 1)),
              6,
            )}
            : it would follow from values that are at odds.
          </p>
          <button type="button" className="link justify-self-start" onClick={() => desk.openPanel('odds')}>
            See what is at odds
          </button>
        </div>
      ) : null}
      {roots ? (
        <CardSection title={`${roots.values.length} solutions`}>
          <p className="text-sm">What is given fits {roots.values.length} solutions, in which this cell is:</p>
          <ul className="mt-1 text-sm" aria-label="Values in the solutions">
            {roots.values.map((value, index) => (
              <li key={index} className="font-mono">
                {value} {roots.unit}
              </li>
            ))}
          </ul>
          <p className="mt-1 text-sm text-ink-2">One more value that tells them apart settles it.</p>
        </CardSection>
      ) : null}
      {checks.length > 0 ? (
        <CardSection title="Checks">
          <div className="grid gap-1.5 text-sm">
            {checks.map((line) => (
              <CheckText key={line.key} line={line} />
            ))}
          </div>
        </CardSection>
      ) : null}
    </>
  )
}

/** The values of a cell in each of several solutions, as its row prints them. */
function rootsOf(
  view: BookView,
  stream: RecordOf<'stream'>,
  row: string,
): { values: (string | null)[]; unit: string } | null {
  for (const { values, ...place } of view.solved?.solution.roots?.cells ?? []) {
    if (place.stream !== stream.tag.trim()) continue
    const members = values.map((value) => givenMember(view, { ...place, typed: value, implied: value, by: 0 }))
    if (members[0]?.place?.row !== row) continue
    return { values: members.map(({ implied }) => implied), unit: members[0].unit }
  }
  return null
}
