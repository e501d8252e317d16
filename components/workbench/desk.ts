import type { GridPlace } from '@/hooks/grid-model'
import type { Change } from '@/lib/book/change'
import { isEmptyChange } from '@/lib/book/change'
import type { Edit } from '@/lib/book/edits/draft'
import type { PanelKey } from './panel-tabs'

/** A question that hangs on a cell: what stands in the way, and the ways out. */
export type Offer = {
  pane: 'table' | 'links'
  place: GridPlace
  text: string
  ways: { label: string; act: () => void }[]
}

/** What the parts of the workbench may do: edit the book, tell a sentence, ask a question at a place, open a dialog. */
export type Desk = {
  /** Applies an edit; a sentence when it was refused. */
  run: (edit: Edit) => string | null
  /** The same, and the sentence is shown. */
  tryRun: (edit: Edit) => boolean
  tell: (sentence: string) => void
  offer: (offer: Offer) => void
  openMenu: (menu: { pane: 'table' | 'links'; place: GridPlace; at: { x: number; y: number } }) => void
  openDialog: (dialog: DialogRequest) => void
  /** Opens a panel under the stream table and brings the focus there. */
  openPanel: (panel: PanelKey) => void
  /** Brings the cursor of a pane to a place. */
  show: (pane: 'table' | 'links', place: GridPlace) => void
}

export type DialogRequest =
  | { kind: 'add'; what: 'stream' | 'component' | 'unit'; after: string | null | undefined }
  | { kind: 'component'; id: string }
  | { kind: 'presence'; streamId: string | null }
  /** null: a new row. */
  | { kind: 'measure'; id: string | null }

export function runner(editBook: (change: Change) => string | null): Desk['run'] {
  return (edit) => {
    if (!edit.ok) return edit.error
    return isEmptyChange(edit.value) ? null : editBook(edit.value)
  }
}
