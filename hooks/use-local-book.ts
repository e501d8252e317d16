'use client'

import { useCallback, useRef, useState } from 'react'
import { apply, type Change } from '@/lib/book/change'
import { check } from '@/lib/book/check'
import { conflictsText } from '@/lib/book/conflict-text'
import type { BookRecord } from '@/lib/book/kinds'
import { type BookState, stateOf } from '@/lib/book/state'
import type { BookHandle } from './book-handle'
import { useHistory } from './use-history'

/** A book that lives in this page only: the sample book of the front page. */
export function useLocalBook(records: readonly BookRecord[], onRefused: (sentence: string) => void): BookHandle {
  const [state, setState] = useState<BookState>(() => stateOf(records))
  const latest = useRef(state)
  const write = useCallback((change: Change): string | null => {
    const applied = apply(latest.current, change)
    if (!applied.ok) return conflictsText(latest.current, applied.conflicts)
    const problems = check(applied.state, change)
    if (problems[0]) return problems[0].what
    latest.current = applied.state
    setState(applied.state)
    return null
  }, [])
  const current = useCallback(() => latest.current, [])
  const { history, remember } = useHistory({ current, write }, onRefused)
  const edit = useCallback(
    (change: Change): string | null => {
      const refused = write(change)
      if (refused === null) remember(change)
      return refused
    },
    [write, remember],
  )
  return { state, mayEdit: true, save: { status: 'saved' }, edit, history }
}
