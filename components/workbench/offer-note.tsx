'use client'

import { useEffect, useRef } from 'react'
import { PlaceNote } from '@/components/grid/place-note'
import { Button } from '@/components/ui/button'
import type { Offer } from './desk'

type OfferNoteProps = { offer: Offer; cellId: string; onDone: () => void }

/** What stands in the way, at the place itself, with the ways out. Esc leaves everything as it is. */
export function OfferNote({ offer, cellId, onDone }: OfferNoteProps) {
  const first = useRef<HTMLButtonElement>(null)
  const cell = () => document.getElementById(cellId)
  useEffect(() => first.current?.focus(), [])
  const done = () => {
    onDone()
    cell()?.focus({ preventScroll: true })
  }
  return (
    <PlaceNote beside={cell} tone="plain">
      <div
        role="alertdialog"
        aria-label={offer.text}
        onKeyDown={(event) => {
          event.stopPropagation()
          if (event.key === 'Escape') done()
        }}
        onBlur={(event) => {
          if (!event.currentTarget.contains(event.relatedTarget)) onDone()
        }}
      >
        <p>{offer.text}</p>
        <div className="mt-2 grid gap-1.5">
          {offer.ways.map((way, index) => (
            <Button
              key={way.label}
              ref={index === 0 ? first : undefined}
              size="small"
              className="h-auto min-h-7 justify-start py-1 text-start whitespace-normal"
              onClick={() => {
                way.act()
                done()
              }}
            >
              {way.label}
            </Button>
          ))}
          <Button size="small" look="quiet" className="justify-start" onClick={done}>
            Leave it as it is
          </Button>
        </div>
      </div>
    </PlaceNote>
  )
}
