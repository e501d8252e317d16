'use client'

import { RotateCcw } from 'lucide-react'
import { Button } from '@/components/ui/button'
import { invitation, typedAtFirst } from './plant'
import { PlantTable } from './plant-table'
import type { PlantView } from './plant-view'
import { cellName, howFar } from './plant-words'
import { usePlant } from './use-plant'

/** The front page's own little plant: the sentence that says how far it is, the table to type in, and what connects to what. */
export function LivePlant({ first }: { first: PlantView }) {
  const { view, typed, wrong, type, reset } = usePlant(first)
  const { lead, rest } = howFar(view)
  const reason = [...wrong.values()].at(-1)?.reason
  const isAsItWas = typed === typedAtFirst && wrong.size === 0
  const total = view.given + view.solvable + view.unknown + view.atOdds || 1

  const hint = isAsItWas
    ? `An invented plant. Try ${invitation.value} in ${cellName(invitation.key)}: the return line falls into place.`
    : view.clashes.length > 0
      ? 'Clear or correct one of the marked cells. Nothing is averaged or dropped for you.'
      : 'Now clear a sand cell, or type over a green one: what cannot hold together is named.'

  return (
    <section aria-label="A little plant to try" className="sheet overflow-hidden">
      <div>
        <div className="flex min-h-[66px] flex-wrap items-center gap-x-3 gap-y-2 px-4 py-2.5">
          <p role="status" className="min-w-0 flex-1 basis-72">
            {reason ?? (
              <>
                <strong>{lead}</strong>
                {rest}
              </>
            )}
          </p>
          <div className="flex flex-wrap gap-2">
            {view.closers.slice(0, 3).map((key) => (
              <Button
                key={key}
                size="small"
                className="border-brook! text-brook!"
                onClick={() => document.getElementById(`cell-${key}`)?.focus()}
              >
                {cellName(key)}
              </Button>
            ))}
            {isAsItWas ? null : (
              <Button size="small" look="quiet" onClick={reset}>
                <RotateCcw className="size-3.5" aria-hidden="true" />
                Start over
              </Button>
            )}
          </div>
        </div>
        <div className="flex h-1.5 gap-0.5" aria-hidden="true">
          <span className="bg-given-edge" style={{ flex: view.given / total }} />
          <span className="bg-solved-edge" style={{ flex: view.solvable / total }} />
          <span className="bg-odds-edge" style={{ flex: view.atOdds / total }} />
          <span className="cell-unknown" style={{ flex: view.unknown / total }} />
        </div>
      </div>
      <PlantTable view={view} wrong={wrong} onType={type} />
      <p className="px-4 py-2.5 text-sm text-ink-2">{hint}</p>
    </section>
  )
}
