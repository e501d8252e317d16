'use client'

import type { RecordOf } from '@/lib/book/kinds'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { MemberWays } from '../odds/member-ways'
import { type OddsMember, oddsOf } from '../odds/odds-sets'
import { backToCell } from '../regions'
import { type RowPlace, rowIdOf } from '../rows'
import { sentence } from '../words'
import { CardSection } from './card-parts'

/** More at once cannot be read; settling one usually settles others. */
const SHOWN = 2

type ConflictListProps = {
  view: BookView
  desk: Desk
  stream: RecordOf<'stream'>
  row: RowPlace
}

/** The clashes that a cell takes part in: what the others imply, by how much, and the ways out for each member. */
export function ConflictList({ view, desk, stream, row }: ConflictListProps) {
  const odds = oddsOf(view)
  const rowId = rowIdOf(row)
  const isHere = ({ place }: OddsMember) => place?.row === rowId && place.column === stream.id
  const sets = odds.sets.filter(({ members }) => members.some(isHere))
  const own = sets[0]?.members.filter(isHere) ?? []
  if (own.length === 0) return null
  const done = () => backToCell('table')
  return (
    <CardSection title="At odds">
      {own.map((member) => (
        <div key={member.key} className="mb-2 grid gap-1.5 text-sm">
          <p>
            {sentence(numbers(member))} {settling(member, odds.sets.length, odds.truncated)}
          </p>
          <MemberWays view={view} desk={desk} member={member} onDone={done} />
        </div>
      ))}
      {sets.slice(0, SHOWN).map((set) => (
        <section
          key={set.number}
          aria-label={`Conflict ${set.number}`}
          className="mb-2 border-s-3 border-odds-edge ps-2.5 text-sm"
        >
          <p>
            <strong className="font-semibold">Conflict {set.number}.</strong> {set.where}. The others in it:
          </p>
          <ul className="mt-1 grid gap-1.5">
            {set.members
              .filter((member) => !isHere(member))
              .map((member) => (
                <li key={member.key}>
                  <MemberName desk={desk} member={member} />
                  <p>{numbers(member)}</p>
                </li>
              ))}
          </ul>
        </section>
      ))}
      {sets.length > SHOWN ? (
        <p className="mb-1 text-sm">It takes part in {sets.length - SHOWN} more such sets.</p>
      ) : null}
      <button type="button" className="link text-sm" onClick={() => desk.openPanel('odds')}>
        All that is at odds, with the ways out
      </button>
    </CardSection>
  )
}

/** Leads to the cell of the member; a rule has none. */
export function MemberName({ desk, member }: { desk: Desk; member: Pick<OddsMember, 'place' | 'name'> }) {
  const { place, name } = member
  if (!place) return <>{name}</>
  return (
    <button type="button" className="link text-start" onClick={() => desk.show('table', place)}>
      {name}
    </button>
  )
}

/** "typed 24.00, the others imply 24.560 wt %: off by −0.560." */
function numbers({ typed, implied, by, unit }: OddsMember): string {
  if (typed === null || implied === null) return `off by ${by}.`
  return `typed ${typed}, the others imply ${implied} ${unit}: off by ${by}.`
}

/** "Withdrawing this settles 2 of 3 sets." */
export function settling({ settles }: OddsMember, sets: number, truncated: boolean): string {
  return `Withdrawing this settles ${settles} of ${sets} ${sets === 1 ? 'set' : 'sets'}${truncated ? ' listed' : ''}.`
}
