'use client'

import { CircleAlert, Info, TriangleAlert } from 'lucide-react'
import type { BookView } from './book-view'

const icons = {
  error: <CircleAlert className="size-4 text-odds-edge" aria-hidden="true" />,
  warning: <TriangleAlert className="size-4 text-given-edge" aria-hidden="true" />,
  note: <Info className="size-4 text-ink-3" aria-hidden="true" />,
}
const words = { error: 'Fault', warning: 'Warning', note: 'Note' }

type NoteLine = {
  key: string
  severity: 'error' | 'warning' | 'note'
  text: string
  streamId?: string
  unitId?: string
}

export function noteLines(view: BookView): NoteLine[] {
  const lines: NoteLine[] = [...view.leftOut].map(([id, what]) => ({
    key: `left ${id}`,
    severity: 'error',
    text: what,
  }))
  for (const [index, diagnostic] of (view.solved?.solution.diagnostics ?? []).entries()) {
    const streamId = view.streams.find(({ tag }) => tag.trim() === diagnostic.stream)?.id
    lines.push({
      key: `said ${index}`,
      severity: diagnostic.severity,
      text: diagnostic.text,
      ...(streamId === undefined ? {} : { streamId }),
    })
  }
  const order = { error: 0, warning: 1, note: 2 }
  return lines.sort((a, b) => order[a.severity] - order[b.severity])
}

/** What the solver has to say, and what it could not use, each with a way to the place. */
export function NotesPanel({ view, onStream }: { view: BookView; onStream: (streamId: string) => void }) {
  const lines = noteLines(view)
  if (lines.length === 0) return <p className="px-4 py-3 text-ink-2">Nothing to note: every entry is used.</p>
  return (
    <ul className="divide-y divide-hair">
      {lines.map((line) => (
        <li key={line.key} className="flex items-start gap-2.5 px-4 py-2">
          <span className="mt-0.5">{icons[line.severity]}</span>
          <span className="sr-only">{words[line.severity]}:</span>
          <span className="flex-1">{line.text}</span>
          {line.streamId !== undefined ? (
            <button type="button" className="link text-sm" onClick={() => onStream(line.streamId ?? '')}>
              Show
            </button>
          ) : null}
        </li>
      ))}
    </ul>
  )
}
