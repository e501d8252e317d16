/** What the one grid is told to draw. It knows rows, columns and places; what stands in them is its owner's business. */

/** The two frozen columns at the start of every row. */
export const NAME_COLUMN = '#name'
export const UNIT_COLUMN = '#unit'

export type GridPlace = { row: string; column: string }

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
  /** Why it is marked. */
  description?: string
}

/** Everything that the grid asks of its owner. Replaced whole when what it shows changes. */
export type GridSource = {
  label: string
  /** Frozen rows first, then those that scroll. */
  rows: readonly GridRow[]
  frozen: number
  view: (place: GridPlace) => CellView
  mayEdit: (place: GridPlace) => boolean
  /** What F2 puts into the editor. */
  editText: (place: GridPlace) => string
  /** Takes what was typed; a sentence when it cannot be taken, and then the editor stays open. */
  commit: (place: GridPlace, text: string) => string | null
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

/** Ids in the order of the screen, so that an inserted row or column cannot shift what is meant. */
export type GridRange = { rows: readonly string[]; columns: readonly string[] }

export type GridSelection = { active: GridPlace; anchor: GridPlace }

export type GridEdit = { place: GridPlace; draft: string; mode: 'overwrite' | 'edit'; reason: string | null }
