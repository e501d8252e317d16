'use client'

import { useEffect, useState } from 'react'
import { classNames } from '@/components/ui/class-names'
import { usePanels } from '@/hooks/use-panels'
import type { BookView } from './book-view'
import type { PanelKey } from './panel-tabs'
import { stripWords } from './strip-words'

type StripProps = { view: BookView; stale: boolean; trouble: string | null; onPanel: (panel: PanelKey) => void }

/** How far the table is, at all times: one sentence, and the shares of the states under it. */
export function Strip({ view, stale, trouble, onPanel }: StripProps) {
  const slow = useSlow(stale)
  const summary = view.solved?.solution.summary
  const isOpen = summary !== undefined && summary.unknown > 0
  const next = usePanels('next', isOpen ? {} : null)
  const words = stripWords(view, next.stale ? null : next.answer)
  const whole = `${words.lead} ${words.rest}`
  const [said, setSaid] = useState('')
  useEffect(() => {
    // Told once typing pauses, so that a screen reader is not interrupted by every digit.
    const timer = setTimeout(() => setSaid(whole), 900)
    return () => clearTimeout(timer)
  }, [whole])
  const leftOut = view.leftOut.size
  return (
    <section className="sheet relative overflow-hidden px-4 pt-2.5 pb-4 max-sm:px-3" aria-label="How far the table is">
      <p className={classNames('max-sm:text-sm', words.trouble && 'text-odds-ink')}>
        <strong className="font-semibold">{words.lead}</strong> {words.rest}
        {summary && (summary.atOdds > 0 || view.solved?.solution.status === 'atOdds') ? (
          <>
            {' '}
            <button type="button" className="link" onClick={() => onPanel('odds')}>
              See what is at odds
            </button>
          </>
        ) : null}
        {isOpen ? (
          <>
            {' '}
            <button type="button" className="link" onClick={() => onPanel('next')}>
              What to measure next
            </button>
          </>
        ) : null}
        {leftOut > 0 ? (
          <>
            {' '}
            <button type="button" className="link" onClick={() => onPanel('notes')}>
              {leftOut === 1 ? '1 entry is not used' : `${leftOut} entries are not used`}
            </button>
          </>
        ) : null}
        {slow ? <span className="text-ink-2"> Working out the newest edit …</span> : null}
        {trouble ? <span className="text-odds-ink"> {trouble}</span> : null}
      </p>
      <span className="sr-only" aria-live="polite">
        {said}
      </span>
      {summary ? (
        <div
          role="img"
          aria-label={`Given ${summary.given}, solvable now ${summary.solvable}, still unknown ${summary.unknown}, at odds ${summary.atOdds}`}
          className="absolute inset-x-0 bottom-0 flex h-1.5 gap-0.5"
        >
          <Share count={summary.given} className="bg-given-edge" />
          <Share count={summary.solvable} className="bg-solved-edge" />
          <Share count={summary.atOdds} className="bg-odds-edge" />
          <Share
            count={summary.unknown}
            className="bg-[repeating-linear-gradient(135deg,var(--unknown-line)_0_2px,transparent_2px_5px)]"
          />
        </div>
      ) : null}
    </section>
  )
}

/** True once something has been going on for longer than the eye forgives. */
function useSlow(going: boolean): boolean {
  const [slow, setSlow] = useState(false)
  useEffect(() => {
    if (!going) return setSlow(false)
    const timer = setTimeout(() => setSlow(true), 400)
    return () => clearTimeout(timer)
  }, [going])
  return slow
}

const Share = ({ count, className }: { count: number; className: string }) =>
  count > 0 ? (
    <span className={classNames('transition-[flex-grow] duration-300', className)} style={{ flex: count }} />
  ) : null
