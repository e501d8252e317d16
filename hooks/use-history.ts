import { useCallback, useRef, useState } from 'react'
import type { Change } from '@/lib/book/change'
import { dropChange, emptyHistory, type History, pushChange, redo, undo } from '@/lib/book/history'
import { newId } from '@/lib/book/ids'
import type { BookState } from '@/lib/book/state'
import type { EditHistory } from './book-handle'

/** The book that a history belongs to. */
type Written = { current: () => BookState; write: (change: Change) => string | null }

/**
 * One's own changes of this sitting, undone and redone as new changes. Where someone else changed a touched field since,
 * the step is refused with both values, `say` tells it, and the step stays.
 */
export function useHistory({ current, write }: Written, say: (sentence: string) => void) {
  const [shown, setShown] = useState<History>(emptyHistory)
  const latest = useRef(shown)
  const put = useCallback((next: History) => {
    latest.current = next
    setShown(next)
  }, [])
  const remember = useCallback((change: Change) => put(pushChange(latest.current, change)), [put])
  const forget = useCallback((id: string) => put(dropChange(latest.current, id)), [put])
  const take = useCallback(
    (step: typeof undo) => {
      const taken = step(latest.current, current(), newId)
      if (!taken) return
      const refused = taken.ok ? write(taken.value.change) : taken.error.message
      if (refused) say(refused)
      else if (taken.ok) put(taken.value.history)
    },
    [current, write, say, put],
  )
  const history: EditHistory = {
    undo: useCallback(() => take(undo), [take]),
    redo: useCallback(() => take(redo), [take]),
    undoLabel: shown.done.at(-1)?.label ?? null,
    redoLabel: shown.undone.at(-1)?.label ?? null,
  }
  return { history, remember, forget }
}
