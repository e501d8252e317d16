import { apply, type Change, type ChangeConflict } from './change'
import type { BookState } from './state'

/**
 * What one browser holds of a book: the confirmed state at a number, and its own changes that the server has not
 * confirmed yet, in order. What is shown is `apply(confirmed, pending)`. Pure: each function gives a new overlay.
 */
export type Overlay = {
  readonly confirmed: BookState
  readonly number: number
  readonly pending: readonly Change[]
  readonly shown: BookState
  /** The first unconfirmed change that no longer applies, because someone else was there first. */
  readonly broken: { change: Change; conflicts: ChangeConflict[] } | null
}

export type NumberedChange = { number: number; change: Change }

export function overlayOf(confirmed: BookState, number: number, pending: readonly Change[] = []): Overlay {
  let shown = confirmed
  let broken: Overlay['broken'] = null
  for (const change of pending) {
    const applied = apply(shown, change)
    if (applied.ok) shown = applied.state
    else broken ??= { change, conflicts: applied.conflicts }
  }
  return { confirmed, number, pending, shown, broken }
}

/** Adds an own change. Fails, with the reasons, when it does not apply to what is shown. */
export function addPending(
  overlay: Overlay,
  change: Change,
): { ok: true; overlay: Overlay } | { ok: false; conflicts: ChangeConflict[] } {
  const applied = apply(overlay.shown, change)
  if (!applied.ok) return applied
  return { ok: true, overlay: { ...overlay, pending: [...overlay.pending, change], shown: applied.state } }
}

/**
 * Folds in changes that the server numbered, others' or own, in order; those already known are passed over.
 * Returns undefined on a gap in the numbers: the caller fetches what lies between, or the whole book.
 */
export function receive(overlay: Overlay, changes: readonly NumberedChange[]): Overlay | undefined {
  let { confirmed, number, pending } = overlay
  let others = false
  for (const next of changes) {
    if (next.number <= number) continue
    if (next.number !== number + 1) return undefined
    const applied = apply(confirmed, next.change)
    if (!applied.ok) return undefined
    confirmed = applied.state
    number = next.number
    if (pending[0]?.id === next.change.id) pending = pending.slice(1)
    else {
      others = true
      pending = pending.filter((change) => change.id !== next.change.id)
    }
  }
  if (number === overlay.number) return overlay
  // Own changes confirmed in order leave what is shown as it was.
  if (!others) return { ...overlay, confirmed, number, pending }
  return overlayOf(confirmed, number, pending)
}

/** A whole book from the server in place of the confirmed state. An older one than is known is passed over. */
export function replaceConfirmed(overlay: Overlay, confirmed: BookState, number: number): Overlay {
  return number <= overlay.number ? overlay : overlayOf(confirmed, number, overlay.pending)
}

/** Takes one own change back, or puts another in its place. */
export function replacePending(overlay: Overlay, id: string, by: Change | null): Overlay {
  const pending = overlay.pending.flatMap((change) => (change.id === id ? (by ? [by] : []) : [change]))
  return overlayOf(overlay.confirmed, overlay.number, pending)
}
