'use client'

import { ChevronLeft, ChevronRight, Printer } from 'lucide-react'
import { useEffect, useRef } from 'react'
import { Button } from '@/components/ui/button'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { StepSheet, stepHeading } from './step-sheet'
import type { ExplainedHandle } from './use-explained'
import { Waiting } from './waiting'
import { WorkingsPrint } from './workings-print'

type WorkingsPanelProps = {
  view: BookView
  desk: Desk
  handle: ExplainedHandle
  /** The step that is walked to; null: all of it is shown. */
  at: number | null
  onWalk: (step: number | null) => void
}

/** The calculation sheet: how every number that follows can be worked out by hand, step by step. */
export function WorkingsPanel({ view, desk, handle, at, onWalk }: WorkingsPanelProps) {
  const { explained } = handle
  if (!explained) return <Waiting handle={handle} />
  const steps = explained.explanation.workings
  if (steps.length === 0)
    return (
      <p className="max-w-2xl px-4 py-3 text-ink-2">
        Nothing follows from what is typed yet, so there is nothing to work out. Boundaries shows how far each unit is.
      </p>
    )
  const walked = at === null ? undefined : steps[at - 1]
  return (
    <div>
      <div className="sticky top-0 z-2 flex flex-wrap items-center gap-2 border-b border-hair bg-sheet px-4 py-1.5">
        {at === null ? (
          <>
            <Button size="small" onClick={() => onWalk(1)}>
              Work through it
            </Button>
            <span className="text-sm text-ink-2">
              {steps.length === 1 ? '1 step' : `${steps.length} steps`}, the smallest boundary first. In the equations
              F(s) is the total flow of stream s, A(s) the flow of A in it and x A(s) its fraction of 1; a component
              flow is fraction times total.
            </span>
            <span className="flex-1" />
            <Button size="small" look="quiet" onClick={() => window.print()}>
              <Printer className="size-3.5" aria-hidden="true" /> Print the workings
            </Button>
          </>
        ) : (
          <Walk at={at} count={steps.length} onWalk={onWalk} />
        )}
        <Waiting handle={handle} />
      </div>
      <ol className="divide-y divide-hair" aria-label="Workings">
        {(walked ? [walked] : steps).map((step) => (
          <li key={step.step} className="px-4 py-3" id={`step-${step.step}`} tabIndex={-1}>
            <h2 className="flex flex-wrap items-baseline gap-x-3 text-base">
              {stepHeading(step)}
              {at === null ? (
                <button
                  type="button"
                  className="link font-sans text-2xs font-normal"
                  aria-label={`Show in the table: step ${step.step}`}
                  onClick={() => onWalk(step.step)}
                >
                  Show in the table
                </button>
              ) : null}
            </h2>
            <StepSheet view={view} explained={explained} step={step} desk={desk} />
          </li>
        ))}
      </ol>
      <WorkingsPrint view={view} explained={explained} />
    </div>
  )
}

/** Previous and next; Esc leaves. At either end the button stays focusable, so that Esc still finds the workbench. */
function Walk({ at, count, onWalk }: { at: number; count: number; onWalk: WorkingsPanelProps['onWalk'] }) {
  const next = useRef<HTMLButtonElement>(null)
  useEffect(() => next.current?.focus(), [])
  return (
    <fieldset className="flex flex-wrap items-center gap-2">
      <legend className="sr-only">Work through it</legend>
      <Button size="small" aria-disabled={at <= 1} onClick={() => onWalk(Math.max(1, at - 1))}>
        <ChevronLeft className="size-3.5" aria-hidden="true" /> Previous step
      </Button>
      <Button
        ref={next}
        size="small"
        look="main"
        aria-disabled={at >= count}
        onClick={() => onWalk(Math.min(count, at + 1))}
      >
        Next step <ChevronRight className="size-3.5" aria-hidden="true" />
      </Button>
      <span className="text-sm" role="status">
        Step {at} of {count}
      </span>
      <Button size="small" look="quiet" onClick={() => onWalk(null)}>
        Leave (Esc)
      </Button>
    </fieldset>
  )
}
