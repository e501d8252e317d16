import type { Change, ChangeConflict } from '@/lib/book/change'
import type { RecordProblem } from '@/lib/book/check'
import type { BookState } from '@/lib/book/state'

/** How far the unsent edits are. Always shown. */
export type SaveStatus =
  | { status: 'saved' }
  | { status: 'saving'; waiting: number }
  | { status: 'offline'; waiting: number; what: string }
  /** The book is not open to this person any more, or they are signed out: nothing is edited until it is again. */
  | { status: 'ended'; waiting: number; why: 'signedOut' | 'noAccess'; what: string }
  /** Someone else changed a field first. The change is kept until the person chooses. */
  | { status: 'conflict'; change: Change; conflicts: ChangeConflict[]; dropMine: () => void; keepMine: () => void }
  /** The server refused the change; it has been taken back and is kept here to be read. */
  | { status: 'rejected'; change: Change; what: string; problems: RecordProblem[]; dismiss: () => void }

export type EditHistory = {
  undoLabel: string | null
  redoLabel: string | null
  undo: () => void
  redo: () => void
}

/** What a workbench holds of a book, whether it is kept on the server or only in this browser (the sample book). */
export type BookHandle = {
  /** `apply(confirmed, pending)`: what is shown. */
  state: BookState
  mayEdit: boolean
  save: SaveStatus
  /** Applies at once and queues. Returns a plain sentence when it cannot be applied; then nothing has changed. */
  edit: (change: Change) => string | null
  history: EditHistory
}
