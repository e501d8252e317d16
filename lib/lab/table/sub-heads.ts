import { knownBasis } from '../cells/basis'
import { plainSpaces } from '../cells/spaces'
import { isStrongUnit, isUnit, readUnit } from '../cells/unit'
import { headWords, roleOf } from '../heads/roles'
import { type Cell, type Frame, isBlank, textOf } from './grid'
import { isMeasured } from './row-facts'

/** Rows under the heads that say something of the columns rather than of a sample. */
export type SubHead = 'unit' | 'basis' | 'method' | 'uncertainty'

/**
 * What a row says of its columns: by its label ("Unit", "Basis"), or, where the label is blank, by its cells.
 * @param cells the row; @param label the column of labels.
 */
export function subHeadOf(cells: Cell[], label: number): SubHead | undefined {
  const named = plainSpaces(textOf(cells[label]))
  const others = cells.filter((cell, at) => at !== label && !isBlank(cell)).map((cell) => plainSpaces(textOf(cell)))
  if (others.length === 0) return undefined
  const role = named === '' ? undefined : roleOf(named)
  if (role === 'unit' && others.some((text) => readUnit(text) !== undefined || isUnit(text))) return 'unit'
  if (role === 'basis' && !cells.some((cell, at) => at !== label && isMeasured(cell))) return 'basis'
  if (role === 'method') return 'method'
  if (role === 'uncertainty') return 'uncertainty'
  if (named !== '' && !/^\W+$/.test(named) && !/^\[.*\]$/.test(named)) return undefined
  if (others.every((text) => knownBasis(text) !== undefined)) return 'basis'
  if (cells.some((cell, at) => at !== label && isMeasured(cell) && textOf(cell).trim() !== '1')) return undefined
  const units = others.filter((text) => readUnit(text) !== undefined).length
  const strong = others.some(
    (text) => isStrongUnit(text) || /^[[(].*[)\]]$/.test(text) || readUnit(text)?.basis || /[%°/]/.test(text),
  )
  return units >= others.length * 0.6 && strong ? 'unit' : undefined
}

/** Whether a row, read on its own, holds only units or bases behind a blank or saying label. */
export function isSubHead(row: Cell[]): boolean {
  const first = row.findIndex((cell) => !isBlank(cell))
  if (first < 0) return false
  if (/^(?:unit|units|einheit|einheiten|basis|bezug)$/.test(headWords(textOf(row[first]))))
    return subHeadOf(row, first) !== undefined
  return first > 0
    ? subHeadOf(row, 0) !== undefined
    : row.every((cell) => isBlank(cell) || readUnit(textOf(cell)) !== undefined) &&
        subHeadOf(['', ...row], 0) !== undefined
}

/** A frame's row as cells. */
export function cellsOf(frame: Frame, row: number): Cell[] {
  return Array.from({ length: frame.width }, (_, column) => frame.at(row, column))
}
