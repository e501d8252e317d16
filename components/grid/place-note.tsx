'use client'

import { type ReactNode, useLayoutEffect, useRef, useState } from 'react'
import { createPortal } from 'react-dom'
import { classNames } from '@/components/ui/class-names'

type PlaceNoteProps = {
  /** Finds the element that it speaks about; asked again whenever something moves. */
  beside: () => HTMLElement | null
  tone: 'problem' | 'plain'
  children: ReactNode
}

/** A note that hangs on a place of the sheet, over everything, so that no pane clips it. */
export function PlaceNote({ beside, tone, children }: PlaceNoteProps) {
  const note = useRef<HTMLDivElement>(null)
  const [at, setAt] = useState<{ left: number; top: number } | null>(null)
  useLayoutEffect(() => {
    const place = () => {
      const box = beside()?.getBoundingClientRect()
      const own = note.current?.getBoundingClientRect()
      if (!box || !own) return
      const left = Math.max(8, Math.min(box.left, window.innerWidth - own.width - 8))
      const below = box.bottom + 5
      const top = below + own.height > window.innerHeight - 8 ? Math.max(8, box.top - own.height - 5) : below
      setAt((last) => (last?.left === left && last.top === top ? last : { left, top }))
    }
    place()
    window.addEventListener('scroll', place, true)
    window.addEventListener('resize', place)
    return () => {
      window.removeEventListener('scroll', place, true)
      window.removeEventListener('resize', place)
    }
  })
  return createPortal(
    <div
      ref={note}
      className={classNames(
        'fixed z-50 max-w-80 min-w-24 rounded-control border bg-sheet px-3 py-2 text-sm shadow-lifted',
        tone === 'problem' ? 'border-odds-edge text-odds-ink' : 'border-hair-2 text-ink',
      )}
      // Not `visibility`: what is inside must take the focus before it is placed.
      style={at ?? { left: 0, top: 0, opacity: 0 }}
    >
      {children}
    </div>,
    document.body,
  )
}
