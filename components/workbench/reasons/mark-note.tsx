'use client'

import { X } from 'lucide-react'
import type { Reasons } from './reasons'

/** Says which boundary the panes mark, and takes the mark away. */
export function MarkNote({ reasons: { marked, at, onMark } }: { reasons: Reasons }) {
  if (!marked || at !== null) return null
  const units = marked.units.length > 3 ? `${marked.units.length} units` : marked.units.join(', ')
  return (
    <button
      type="button"
      className="ms-2 inline-flex flex-none items-center gap-1 rounded-control border border-brook px-2 py-0.5 text-2xs whitespace-nowrap text-brook"
      onClick={() => onMark(null)}
    >
      Boundary marked: {units} <X className="size-3" aria-hidden="true" />
      <span className="sr-only">, take the mark away</span>
    </button>
  )
}
