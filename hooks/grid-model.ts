import type { Cell, Lines } from '@/lib/sheet/selection'

/** What the one grid is told to draw. It knows rows, columns and places; what stands in them is its owner's business. */

export const ASKED = Symbol('asked')

/** The two frozen columns at the start of every row. */
export const NAME_COLUMN = '#name'
export const UNIT_COLUMN = '#unit'

export type GridPlace = Cell

export type GridRow = {
  id: string
  /** px */
  size: number
  /** A section's heading spans the sheet and opens or closes the rows under it. */
  section?: { open: boolean }
}

export type CellTone =
  | 'given'
  | 'solvable'
  | 'unknown'
  | 'atOdds'
  | 'absent'
  | 'plain'
  | 'in'
  | 'out'
  | 'tag'
  | 'name'
  | 'end'
  | 'label'
  | 'total'
  | 'kind'
  | 'section'

/** One cell as it is drawn and as it is said. */
export type CellView = {
  text: string
  /** The whole accessible name: "Total flow, stream 107: 10 939 kg/h, solvable now". */
  label: string
  tone: CellTone
  /** A second, muted text in a row head. */
  aside?: string
  bold?: boolean
  /** A wrong entry, a doubtful value, or a broken connection. */
  mark?: 'wrong' | 'flag' | 'broken'
  /** A value stands here that is not used. */
  kept?: 'check' | 'withdrawn' | 'difference'
  /** How many readings stand here, where more than one. */
  readings?: number
  /** Why it is marked. */
  description?: string
  /** A cap over the cell: the boundary that is looked at is crossed here. The label says so too. */
  capped?: boolean
}

/** Everything that the grid asks of its owner. Replaced whole when what it shows changes. */
export type GridSource = {
  label: string
  /** Frozen rows first, then those that scroll. */
  rows: readonly GridRow[]
  frozen: number
  view: (place: GridPlace) => CellView
  /** Whether the editor opens here. */
  mayEdit: (place: GridPlace) => boolean
  /** Whether nothing can be changed here, neither by typing nor by a key or a click. */
  isReadOnly: (place: GridPlace) => boolean
  /** What F2 puts into the editor. */
  editText: (place: GridPlace) => string
  /**
   * Takes what was typed. A sentence: it cannot be taken, and the editor stays open. ASKED: a question hangs on the
   * cell now, and the cursor stays there.
   */
  commit: (place: GridPlace, text: string) => string | typeof ASKED | null
  /** Words offered while typing. */
  suggestions?: (place: GridPlace) => readonly string[]
  /** Delete. */
  clear: (places: GridRange) => void
  /** Space, Enter, or a click on a cell that is switched rather than typed; true when it was one. */
  activate?: (place: GridPlace, how: 'space' | 'enter' | 'click') => boolean
  /** A letter that does something here; true when it did. */
  letter?: (place: GridPlace, key: string) => boolean
  /** Opens the menu of a row or column at a point of the window. */
  menu?: (place: GridPlace, at: { x: number; y: number }) => void
  /** Alt and an arrow: moves a row or a column. */
  shift?: (place: GridPlace, by: { rows: number; columns: number }) => void
  copy: (range: GridRange) => { text: string; html: string }
  paste: (range: GridRange, data: { text: string; html: string }) => void
}

/** The selected rows and columns, by id, in the order shown. */
export type GridRange = Lines

export type GridEdit = { place: GridPlace; draft: string; mode: 'overwrite' | 'edit'; reason: string | null }

/** Whether a cell shows a value, for jumps to the edge of a block. */
export function isFilled(source: GridSource, place: GridPlace): boolean {
  const { tone, text } = source.view(place)
  return text !== '' && tone !== 'unknown' && tone !== 'absent'
}
