import { useCallback, useRef, useState } from 'react'
import { type Change, invert } from '@/lib/book/change'
import { newId } from '@/lib/book/ids'
import type { EditHistory } from './book-handle'

type Stacks = { undo: readonly Change[]; redo: readonly Change[] }

/**
 * One's own changes of this sitting, undone and redone as new changes. Where someone else changed a touched field since,
 * the edit is refused with both values and the entry stays.
 */
export function useHistory(
  edit: (change: Change) => string | null,
  onRefused: (sentence: string) => void,
): { history: EditHistory; remember: (change: Change) => void } {
  const [stacks, setStacks] = useState<Stacks>({ undo: [], redo: [] })
  const latest = useRef(stacks)
  const put = useCallback((next: Stacks) => {
    latest.current = next
    setStacks(next)
  }, [])
  const remember = useCallback((change: Change) => put({ undo: [...latest.current.undo, change], redo: [] }), [put])
  const step = useCallback(
    (from: 'undo' | 'redo') => {
      const to = from === 'undo' ? 'redo' : 'undo'
      const stack = latest.current[from]
      const change = stack[stack.length - 1]
      if (!change) return
      const inverse = invert(change, newId())
      const refused = edit(inverse)
      if (refused) onRefused(refused)
      else put({ ...latest.current, [from]: stack.slice(0, -1), [to]: [...latest.current[to], inverse] })
    },
    [edit, onRefused, put],
  )
  const undo = useCallback(() => step('undo'), [step])
  const redo = useCallback(() => step('redo'), [step])
  const history = {
    undo,
    redo,
    undoLabel: stacks.undo[stacks.undo.length - 1]?.label ?? null,
    redoLabel: stacks.redo[stacks.redo.length - 1]?.label ?? null,
  }
  return { history, remember }
}
