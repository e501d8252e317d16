'use client'

import { type KeyboardEvent, useId, useLayoutEffect, useRef, useState } from 'react'
import type { GridEdit } from '@/hooks/grid-model'
import { PlaceNote } from './place-note'

/** The key that moves the cursor after an edit; null: it stays (the edit ended by leaving the cell). */
export type AfterEdit = { key: string; shift: boolean } | null

type CellEditorProps = {
  edit: GridEdit
  label: string
  side: 'start' | 'end'
  words: readonly string[]
  onCommit: (text: string, after: AfterEdit) => void
  onCancel: () => void
}

const arrows = ['ArrowUp', 'ArrowDown', 'ArrowLeft', 'ArrowRight']
const MOST_WORDS = 8

/** The input that stands in a cell while it is typed into. It keeps what was typed until it is taken or given up. */
export function CellEditor({ edit, label, side, words, onCommit, onCancel }: CellEditorProps) {
  const input = useRef<HTMLInputElement>(null)
  const [text, setText] = useState(edit.draft)
  const [mode, setMode] = useState(edit.mode)
  const [chosen, setChosen] = useState(-1)
  const done = useRef(false)
  const listId = useId()
  const noteId = useId()

  useLayoutEffect(() => {
    const element = input.current
    element?.focus({ preventScroll: true })
    if (edit.mode === 'edit') element?.setSelectionRange(edit.draft.length, edit.draft.length)
  }, [edit.mode, edit.draft])
  useLayoutEffect(() => {
    if (edit.reason) done.current = false
  }, [edit])

  const typed = text.trim().toLowerCase()
  const offered = words.filter((word) => word.toLowerCase().includes(typed)).slice(0, MOST_WORDS)
  const finish = (value: string, after: AfterEdit) => {
    if (done.current) return
    done.current = true
    onCommit(value, after)
  }
  const onKeyDown = (event: KeyboardEvent) => {
    event.stopPropagation()
    if (event.nativeEvent.isComposing || event.keyCode === 229) return
    const value = offered[chosen] ?? text
    if (event.key === 'Enter' || event.key === 'Tab') {
      event.preventDefault()
      finish(value, { key: event.key, shift: event.shiftKey })
    } else if (event.key === 'Escape') {
      event.preventDefault()
      done.current = true
      onCancel()
    } else if (event.key === 'F2') {
      event.preventDefault()
      setMode(mode === 'edit' ? 'overwrite' : 'edit')
    } else if (offered.length > 0 && (event.key === 'ArrowDown' || event.key === 'ArrowUp')) {
      event.preventDefault()
      const step = event.key === 'ArrowDown' ? 1 : -1
      setChosen(Math.max(-1, Math.min(offered.length - 1, chosen + step)))
    } else if (mode === 'overwrite' && arrows.includes(event.key) && !event.shiftKey) {
      event.preventDefault()
      finish(text, { key: event.key, shift: false })
    }
  }
  return (
    <>
      <input
        ref={input}
        className="grid-editor"
        data-side={side}
        value={text}
        size={Math.max(4, text.length + 1)}
        spellCheck={false}
        autoComplete="off"
        aria-label={label}
        aria-invalid={edit.reason ? true : undefined}
        aria-describedby={edit.reason ? noteId : undefined}
        {...(words.length > 0
          ? {
              role: 'combobox',
              'aria-expanded': offered.length > 0,
              'aria-controls': listId,
              'aria-autocomplete': 'list' as const,
              'aria-activedescendant': chosen >= 0 ? `${listId}-${chosen}` : undefined,
            }
          : {})}
        onChange={(event) => {
          setText(event.target.value)
          setChosen(-1)
        }}
        onKeyDown={onKeyDown}
        onMouseDown={() => setMode('edit')}
        // What was refused stays in its cell, marked, until it is mended or given up.
        onBlur={() => (edit.reason && text === edit.draft ? undefined : finish(text, null))}
        onCopy={(event) => event.stopPropagation()}
        onCut={(event) => event.stopPropagation()}
        onPaste={(event) => event.stopPropagation()}
      />
      {edit.reason ? (
        <PlaceNote beside={() => input.current} tone="problem">
          <p id={noteId} role="alert">
            {edit.reason}
          </p>
        </PlaceNote>
      ) : words.length > 0 && offered.length > 0 ? (
        <PlaceNote beside={() => input.current} tone="plain">
          <div id={listId} role="listbox" aria-label={`${label}: known tags`} className="-mx-1.5 -my-1">
            {offered.map((word, index) => (
              // biome-ignore lint/a11y/useKeyWithClickEvents: the input's arrow keys and Enter choose
              <div
                key={word}
                id={`${listId}-${index}`}
                role="option"
                aria-selected={index === chosen}
                tabIndex={-1}
                className="cursor-pointer rounded-md px-2 py-0.5 aria-selected:bg-brook-wash hover:bg-brook-wash"
                onMouseDown={(event) => event.preventDefault()}
                onClick={() => finish(word, { key: 'Enter', shift: false })}
              >
                {word}
              </div>
            ))}
          </div>
        </PlaceNote>
      ) : null}
    </>
  )
}
