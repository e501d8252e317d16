'use client'

import { useRef } from 'react'
import { Button } from '@/components/ui/button'
import { listed } from '@/lib/book/edits/draft'
import { setUse } from '@/lib/book/edits/ways-out'
import { newId } from '@/lib/book/ids'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { lowered } from '../words'
import { KeptAside } from './kept-aside'
import { OddsSetList } from './odds-set-list'
import { bestWithdrawals, type Odds, oddsOf } from './odds-sets'

/** More equally good ones than this say nothing: any member will do. */
const NAMED = 3

/** Everything that is at odds, set by set, with the ways out; and what was set aside, with the way back. */
export function OddsPanel({ view, desk }: { view: BookView; desk: Desk }) {
  const root = useRef<HTMLDivElement>(null)
  const odds = oddsOf(view)
  // The button that was pressed is gone once its set is settled: the list keeps the focus.
  const done = () => root.current?.focus()
  return (
    <div ref={root} tabIndex={-1} className="focus:outline-none">
      {odds.sets.length === 0 ? (
        <p className="px-4 py-3 text-ink-2">Nothing is at odds: all that is used holds together.</p>
      ) : (
        <Lead view={view} desk={desk} odds={odds} onDone={done} />
      )}
      <OddsSetList view={view} desk={desk} odds={odds} onDone={done} />
      <KeptAside view={view} desk={desk} onDone={done} />
    </div>
  )
}

type LeadProps = { view: BookView; desk: Desk; odds: Odds; onDone: () => void }

/** How many sets there are, and the single withdrawal that settles most of them. */
function Lead({ view, desk, odds, onDone }: LeadProps) {
  const { sets, truncated } = odds
  const best = bestWithdrawals(odds)
  const most = best[0]?.settles ?? 0
  const all = sets.length === 1 ? '1 set' : `${truncated ? 'the ' : ''}${sets.length} sets`
  const first = best.length > NAMED ? [] : best
  return (
    <div className="grid gap-2 border-b border-hair px-4 py-3">
      <p>
        <strong className="font-semibold">
          {sets.length === 1 ? '1 set of values cannot hold.' : `${sets.length} sets of values cannot hold.`}
        </strong>{' '}
        {truncated ? 'There are more; these are the first that were found. ' : ''}
        {first.length > 0
          ? `Withdrawing ${orListed(first.map(({ name }) => lowered(name)))} settles ${most} of ${all}, more than any other.`
          : sets.length === 1
            ? 'Withdrawing any one of its members settles it. '
            : `No single value stands out: withdrawing any one of ${best.length} settles ${most} of ${all}. `}
        {first.length === 0 ? 'Which of them is wrong only the plant can tell. ' : ' '}
        Values with an uncertainty are readings; they stay at odds until they are reconciled, which comes with Readings.
      </p>
      {view.mayEdit && first.length > 0 ? (
        <div className="flex flex-wrap gap-2">
          {first.map(({ key, ref, name }) =>
            ref ? (
              <Button
                key={key}
                size="small"
                onClick={() => {
                  if (desk.tryRun(setUse(view.state, ref, 'withdrawn', newId))) onDone()
                }}
              >
                Withdraw {lowered(name)}
              </Button>
            ) : null,
          )}
        </div>
      ) : null}
    </div>
  )
}

const orListed = (names: string[]): string =>
  names.length > 1 ? `either ${listed(names).replace(' and ', ' or ')}` : listed(names)
