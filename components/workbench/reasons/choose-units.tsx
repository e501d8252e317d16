'use client'

import { useEffect, useRef, useState } from 'react'
import { usePanels } from '@/hooks/use-panels'
import type { CountedBoundary } from '@/lib/balance'
import type { BookView } from '../book-view'

type ChooseUnitsProps = { view: BookView; onCounted: (boundary: CountedBoundary) => void }

/** A boundary round any units: ticked, counted at once, and listed first. */
export function ChooseUnits({ view, onCounted }: ChooseUnitsProps) {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set())
  const units = view.plant.filter(({ id }) => chosen.has(id)).map(({ tag }) => tag.trim())
  const { answer, stale, trouble } = usePanels('boundary', units.length > 0 ? { units } : null)
  const told = useRef<CountedBoundary | null>(null)
  useEffect(() => {
    if (!answer || stale || told.current === answer) return
    told.current = answer
    onCounted(answer)
  }, [answer, stale, onCounted])
  return (
    <fieldset className="rounded-control border border-hair px-3 pt-1 pb-2">
      <legend className="px-1 text-sm text-ink-2">Choose units</legend>
      <div className="flex flex-wrap gap-x-4 gap-y-1">
        {view.plant.map(({ id, tag, name }) => (
          <label key={id} className="flex min-h-6 items-center gap-1.5 text-sm" title={name}>
            <input
              type="checkbox"
              className="size-4 accent-brook"
              checked={chosen.has(id)}
              onChange={() => {
                const next = new Set(chosen)
                if (!next.delete(id)) next.add(id)
                setChosen(next)
              }}
            />
            {tag}
          </label>
        ))}
      </div>
      <p className="mt-1 text-2xs text-ink-2" role="status">
        {units.length === 0
          ? 'Tick units to see the boundary round them.'
          : (trouble ??
            (stale
              ? 'Counting …'
              : answer === null
                ? 'This boundary cannot be counted.'
                : `${answer.crossing.length} streams cross it: ${answer.crossing.join(', ')}.`))}
      </p>
    </fieldset>
  )
}
