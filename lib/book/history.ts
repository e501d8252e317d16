import type { Result } from '@/lib/errors'
import { apply, type Change, type ChangeConflict, invert, isEmptyChange } from './change'
import { check } from './check'
import { conflictsText } from './conflict-text'
import type { BookState } from './state'

/** One's own changes of a sitting, for undo and redo. Changes of others are in neither list. Pure: each function gives a new one. */
export type History = {
  /** Done, the latest last. */
  readonly done: readonly Change[]
  /** Taken back, the latest last. */
  readonly undone: readonly Change[]
}

export type HistoryRefusal = { message: string; conflicts: ChangeConflict[] }
export type HistoryStep = Result<{ change: Change; state: BookState; history: History }, HistoryRefusal>

export const emptyHistory: History = { done: [], undone: [] }

/** Notes a change just made. What was taken back before can then not be done again. */
export function pushChange(history: History, change: Change): History {
  return isEmptyChange(change) ? history : { done: [...history.done, change], undone: [] }
}

/**
 * The change that takes the latest one back, applied to `state`. Refused, with both values, where someone else has
 * changed the same since; the history is then as before (`skipUndo` passes that step over). Undefined: nothing to undo.
 */
export function undo(history: History, state: BookState, makeId: () => string): HistoryStep | undefined {
  const last = history.done.at(-1)
  if (!last) return undefined
  const change = invert(last, makeId(), `Undo: ${last.label}`.slice(0, 300))
  return step(state, change, 'Undo', { done: history.done.slice(0, -1), undone: [...history.undone, last] })
}

/** The change that does again what was last taken back. Refused as `undo` is. Undefined: nothing to redo. */
export function redo(history: History, state: BookState, makeId: () => string): HistoryStep | undefined {
  const last = history.undone.at(-1)
  if (!last) return undefined
  // A new id: the same id sent again would be answered with its first result.
  const change = { ...last, id: makeId() }
  return step(state, change, 'Redo', { done: [...history.done, change], undone: history.undone.slice(0, -1) })
}

/** Passes the latest step over, when it can no longer be taken back. */
export const skipUndo = (history: History): History => ({ ...history, done: history.done.slice(0, -1) })
export const skipRedo = (history: History): History => ({ ...history, undone: history.undone.slice(0, -1) })

/** A change that the server refused: it never happened, so there is nothing of it to take back. */
export const dropChange = (history: History, id: string): History => ({
  done: history.done.filter((change) => change.id !== id),
  undone: history.undone.filter((change) => change.id !== id),
})

function step(state: BookState, change: Change, way: 'Undo' | 'Redo', history: History): HistoryStep {
  const applied = apply(state, change)
  if (!applied.ok) {
    const why = conflictsText(state, applied.conflicts)
    return { ok: false, error: { message: `${way} is not possible: ${why}`, conflicts: applied.conflicts } }
  }
  const [problem] = check(applied.state, change)
  if (problem) return { ok: false, error: { message: `${way} is not possible: ${problem.what}.`, conflicts: [] } }
  return { ok: true, value: { change, state: applied.state, history } }
}
