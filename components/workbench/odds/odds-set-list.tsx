'use client'

import type { BookView } from '../book-view'
import { MemberName } from '../card/conflict-list'
import type { Desk } from '../desk'
import { FractionChoice } from './fraction-choice'
import { MemberWays } from './member-ways'
import type { Odds, OddsMember } from './odds-sets'

type OddsSetListProps = { view: BookView; desk: Desk; odds: Odds; onDone: () => void }

const columns = 'md:grid-cols-[minmax(10rem,1fr)_5.5rem_6.5rem_8rem_5.5rem_19rem] md:items-center md:gap-x-3'

/** Each set with the place where it meets, and each member's numbers in the unit of its row. */
export function OddsSetList({ view, desk, odds, onDone }: OddsSetListProps) {
  return odds.sets.map((set) => {
    const stream = set.fractionsOf === null ? undefined : view.state.stream.get(set.fractionsOf)
    return (
      <section key={set.number} aria-label={`Conflict ${set.number}`} className="border-b border-hair pb-2">
        <h3 className="px-4 pt-2.5 pb-1">
          <span className="font-semibold">Conflict {set.number}.</span> {set.where}.
        </h3>
        {stream ? (
          <div className="max-w-96 px-4 pb-2">
            <FractionChoice
              view={view}
              desk={desk}
              stream={stream}
              label={`Where fractions of ${stream.tag} do not add up, they`}
              onDone={onDone}
            />
          </div>
        ) : null}
        <div aria-hidden="true" className={`hidden px-4 text-xs text-ink-2 md:grid ${columns}`}>
          <span>Value</span>
          <span className="text-end">Typed</span>
          <span className="text-end">Others imply</span>
          <span className="text-end">Off by</span>
          <span className="text-end">Settles</span>
          <span>Ways out</span>
        </div>
        <ul>
          {set.members.map((member) => (
            <li
              key={member.key}
              className={`grid gap-y-1 border-t border-hair px-4 py-1.5 text-sm first:border-0 ${columns}`}
            >
              <span>
                <MemberName desk={desk} member={member} />
              </span>
              <Numbers member={member} sets={odds.sets.length} />
              <MemberWays view={view} desk={desk} member={member} onDone={onDone} />
            </li>
          ))}
        </ul>
      </section>
    )
  })
}

function Numbers({ member, sets }: { member: OddsMember; sets: number }) {
  const { typed, implied, by, unit, settles } = member
  const shown: [string, string | null][] = [
    ['typed', typed],
    ['others imply', implied],
    ['off by', `${by} ${unit}`.trim()],
    ['withdrawing it settles', `${settles} of ${sets}`],
  ]
  return shown.map(([label, value]) => (
    <span key={label} className="font-mono tracking-tight md:text-end">
      <span className="font-sans tracking-normal text-ink-2 md:sr-only">{label} </span>
      {value ?? '–'}
    </span>
  ))
}
