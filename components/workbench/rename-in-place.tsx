'use client'

import { Pencil } from 'lucide-react'
import { useState } from 'react'

type RenameInPlaceProps = {
  value: string
  label: string
  mayEdit: boolean
  /** A sentence when the name was refused. */
  onRename: (name: string) => string | null
}

/** A heading that turns into an input when it is pressed. Enter takes the name, Esc leaves the old one. */
export function RenameInPlace({ value, label, mayEdit, onRename }: RenameInPlaceProps) {
  const [draft, setDraft] = useState<string | null>(null)
  const [reason, setReason] = useState<string | null>(null)
  const finish = () => {
    if (draft === null) return
    const refused = draft.trim() === value ? null : onRename(draft.trim())
    setReason(refused)
    if (!refused) setDraft(null)
  }
  if (draft === null)
    return (
      <h1 className="min-w-0 text-lg max-sm:text-md">
        {mayEdit ? (
          <button
            type="button"
            title="Rename"
            className="group inline-flex max-w-full items-center gap-1.5 text-start"
            onClick={() => setDraft(value)}
          >
            <span className="line-clamp-2">{value}</span>
            <Pencil
              className="size-3.5 shrink-0 text-ink-3 opacity-0 group-hover:opacity-100 group-focus-visible:opacity-100"
              aria-hidden="true"
            />
          </button>
        ) : (
          value
        )}
      </h1>
    )
  return (
    <span className="relative">
      <input
        // biome-ignore lint/a11y/noAutofocus: the person pressed the name to type here
        autoFocus
        aria-label={label}
        aria-invalid={reason ? true : undefined}
        className="w-[28ch] max-w-full rounded-control border border-edge bg-sheet px-2 py-1 font-heading text-lg font-semibold"
        value={draft}
        onFocus={(event) => event.target.select()}
        onChange={(event) => setDraft(event.target.value)}
        onBlur={finish}
        onKeyDown={(event) => {
          if (event.nativeEvent.isComposing) return
          if (event.key === 'Enter') finish()
          if (event.key === 'Escape') {
            setReason(null)
            setDraft(null)
          }
        }}
      />
      {reason ? (
        <span
          role="alert"
          className="absolute start-0 top-full z-10 mt-1 w-max max-w-72 rounded-control border border-odds-edge bg-sheet px-2 py-1 text-sm text-odds-ink"
        >
          {reason}
        </span>
      ) : null}
    </span>
  )
}
