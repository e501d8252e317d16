import { parseCell } from '../cells/cell'
import { readDate } from '../cells/date'
import { plainSpaces } from '../cells/spaces'
import { type Cell, isBlank, textOf } from './grid'

/** What a row looks like, without knowing yet what its columns are. */
export type RowFacts = {
  filled: number
  /** Cells that read as results or dates; a dash, which heads have too, is not counted. */
  measured: number
  first: number
}

export function rowFacts(row: Cell[], columns?: number[]): RowFacts {
  const facts: RowFacts = { filled: 0, measured: 0, first: -1 }
  const look = (at: number) => {
    const cell = row[at]
    if (isBlank(cell)) return
    facts.filled++
    if (facts.first < 0) facts.first = at
    if (isMeasured(cell as Cell)) facts.measured++
  }
  if (columns) for (const at of columns) look(at)
  else for (let at = 0; at < row.length; at++) look(at)
  return facts
}

/** Whether a row has a cell that reads as a result or date, from its end: ids stand at the start. */
export function hasMeasured(row: Cell[]): boolean {
  for (let at = row.length - 1; at >= 0; at--) if (!isBlank(row[at]) && isMeasured(row[at] as Cell)) return true
  return false
}

/** Whether a cell reads as a result or a date. */
export function isMeasured(cell: Cell): boolean {
  if (typeof cell !== 'string') return cell.number !== undefined || cell.date !== undefined
  const text = plainSpaces(cell)
  if (text === '' || /^[-–—]$/.test(text)) return false
  if (/^\d+(?:[.,]\d+)?$/.test(text)) return true
  // IS, NA, NB, ND are elements' signs or words of heads as often as qualifiers.
  if (/^(?:N[ABDNR]|Na|Nb|Nd|In|Is|IS|tr|Rest|Balance|Difference|LOD)$/.test(text)) return false
  return parseCell(text) !== undefined || readDate(text) !== undefined
}

/** A rule drawn with signs under a head: "-----", "|---|:--:|". */
export function isDrawnRule(row: Cell[]): boolean {
  let drawn = 0
  for (const cell of row) {
    if (isBlank(cell)) continue
    if (!/^[|+]?:?[-=_–—+]{2,}:?[|+]?$/.test(textOf(cell).replace(/\s/g, ''))) return false
    drawn++
  }
  return drawn > 0
}
