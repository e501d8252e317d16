'use client'

import { useRef } from 'react'
import { usePanels } from '@/hooks/use-panels'
import type { MeasureNext } from '@/lib/balance'
import { setOutOfReach } from '@/lib/book/cannot-measure'
import { counted } from '@/lib/book/edits/draft'
import { newId } from '@/lib/book/ids'
import { type BookView, gridPlaceOf, streamIdOf } from '../book-view'
import type { Desk } from '../desk'
import { placeWords, sentence } from '../words'
import { CannotList } from './cannot-list'

type NextPanelProps = { view: BookView; desk: Desk }
type Place = MeasureNext['set'][number]

const columns = 'md:grid-cols-[minmax(14rem,1fr)_8rem_8rem_13rem] md:items-center md:gap-x-3'

/** Which values to measure or look up next: what each would settle, and a few that close the table. */
export function NextPanel({ view, desk }: NextPanelProps) {
  const root = useRef<HTMLDivElement>(null)
  const unknown = view.solved?.solution.summary.unknown ?? 0
  const { answer, stale, trouble } = usePanels('next', unknown > 0 ? {} : null)
  if (!view.solved) return <p className="px-4 py-3 text-ink-2">Working out what follows …</p>
  // A button that was pressed may be gone from the next list: the panel keeps the focus.
  const done = () => root.current?.focus()
  const singles = answer?.filter(({ set }) => set.length === 1) ?? []
  return (
    <div ref={root} tabIndex={-1} className="focus:outline-none">
      {unknown === 0 ? (
        <p className="px-4 py-3 text-ink-2">Nothing is still unknown: there is nothing to measure.</p>
      ) : null}
      {trouble ? <p className="px-4 py-3 text-odds-ink">What to measure next is not known. {trouble}</p> : null}
      {unknown > 0 && !trouble && stale ? (
        <p className="px-4 pt-3 text-ink-2" aria-live="polite">
          Working out what to measure next …
        </p>
      ) : null}
      {unknown > 0 && answer ? <Lead view={view} desk={desk} next={answer} unknown={unknown} /> : null}
      {unknown > 0 && singles.length > 0 ? (
        <section aria-label="Single values">
          <div aria-hidden="true" className={`hidden px-4 py-1 text-xs text-ink-2 md:grid ${columns}`}>
            <span>Value</span>
            <span className="text-end">Cells it settles</span>
            <span className="text-end">Still unknown then</span>
            <span />
          </div>
          <ul>
            {singles.map(({ set: [place], settles, leaves }) =>
              place ? (
                <li
                  key={placeWords(view, place)}
                  className={`grid gap-y-1 border-t border-hair px-4 py-1.5 text-sm ${columns}`}
                >
                  <PlaceName view={view} desk={desk} place={place} />
                  <span className="tabular-nums md:text-end">
                    <span className="md:sr-only">settles </span>
                    {settles}
                  </span>
                  <span className="tabular-nums md:text-end">
                    <span className="md:sr-only">leaves </span>
                    {leaves}
                  </span>
                  <OutOfReach view={view} desk={desk} place={place} onDone={done} />
                </li>
              ) : null,
            )}
          </ul>
        </section>
      ) : null}
      <CannotList view={view} desk={desk} onDone={done} />
    </div>
  )
}

/** One set that closes the table, or goes as far as anything that can be measured. */
function Lead({ view, desk, next, unknown }: NextPanelProps & { next: readonly MeasureNext[]; unknown: number }) {
  const [best] = next
  const closers = next.filter(({ set, leaves }) => set.length === 1 && leaves === 0).length
  const are = unknown === 1 ? 'cell is' : 'cells are'
  if (!best)
    return (
      <p className="px-4 py-3">
        {unknown} {are} still unknown. Nothing was found that could be measured to settle more: look for a rule, or for
        a mark “cannot be measured” that could be taken away.
      </p>
    )
  const { set, settles, leaves } = best
  return (
    <div className="grid gap-2 px-4 py-3">
      <p>
        <strong className="font-semibold">
          {unknown} {are} still unknown.
        </strong>{' '}
        {closers > 1
          ? `Any one of the ${closers} values that leave nothing unknown closes the table. Choose one to go to its cell.`
          : leaves === 0
            ? `${set.length === 1 ? 'This value closes' : `These ${set.length} values close`} the table:`
            : `No set was found that closes the table. ${set.length === 1 ? 'This value settles' : `These ${set.length} values settle`} most, ${counted(settles, 'cell')}, and ${leaves === 1 ? '1 stays' : `${leaves} stay`} unknown:`}
      </p>
      {closers > 1 ? null : (
        <ol className="flex flex-wrap gap-x-5 gap-y-1" aria-label="Values to measure">
          {set.map((place) => (
            <li key={placeWords(view, place)}>
              <PlaceName view={view} desk={desk} place={place} />
            </li>
          ))}
        </ol>
      )}
      {set.length > 1 ? (
        <p className="text-sm text-ink-2">Other sets may do as well; this one was found and tried.</p>
      ) : null}
    </div>
  )
}

function PlaceName({ view, desk, place }: NextPanelProps & { place: Place }) {
  const name = sentence(placeWords(view, place))
  const at = gridPlaceOf(view, place)
  if (!at) return <span>{name}</span>
  return (
    <button type="button" className="link text-start" onClick={() => desk.show('table', at)}>
      {name}
    </button>
  )
}

/** Takes a flow, or every analysis of a stream, out of the list. A component's flow is both and has no button. */
function OutOfReach({ view, desk, place, onDone }: NextPanelProps & { place: Place; onDone: () => void }) {
  const stream = streamIdOf(view, place.stream)
  const isFlow = place.component === undefined
  if (!view.mayEdit || stream === null || place.quantity === 'componentFlow') return <span />
  return (
    <button
      type="button"
      className="link justify-self-start text-ink-2"
      onClick={() => {
        if (desk.tryRun(setOutOfReach(view.state, stream, isFlow ? 'flow' : 'analysis', true, newId))) onDone()
      }}
    >
      {isFlow ? `Flow of ${place.stream} cannot be measured` : `${place.stream} cannot be analysed`}
    </button>
  )
}
