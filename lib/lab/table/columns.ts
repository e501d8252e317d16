import { basisOf } from '../cells/basis'
import { plainSpaces } from '../cells/spaces'
import { readUnit } from '../cells/unit'
import { analyteScore } from '../heads/analyte-names'
import { type Head, parseHead } from '../heads/head'
import { idRank, type Role, roleOf } from '../heads/roles'
import { isTotalColumn } from '../heads/totals'
import { type Frame, isBlank, rawOf, textOf } from './grid'
import { type Ledger, parseAny } from './ledger'
import { cellsOf, type SubHead, subHeadOf } from './sub-heads'

export type ColumnUse =
  | 'id'
  | 'stream'
  | 'date'
  | 'time'
  | 'note'
  | 'method'
  | 'about'
  | 'basis'
  | 'result'
  | 'total'
  | 'qualifier'
  | 'uncertainty'
  | 'unit'
  | 'text'

/** What one column of a table with a sample a row is for. `of`: the result column that it says something of. */
export type Column = Head & {
  column: number
  use: ColumnUse
  label: string
  of?: number
  beside: Column[]
  method?: string
  spread?: string
}

/** The columns of a frame and the rows its samples start from. */
export type Layout = { columns: Column[]; subHeads: Map<number, SubHead> }

/** Finds what each column of `frame` (heads in row 0) is for. `turned`: sub-heads may stand anywhere. */
export function layoutOf(frame: Frame, ledger: Ledger, turned: boolean): Layout {
  const heads = Array.from({ length: frame.width }, (_, column) => parseHead(textOf(frame.at(0, column))))
  const roles = heads.map((head) => (head.name === '' ? undefined : roleOf(head.name)))
  const id = idColumn(frame, heads, roles)
  const subHeads = findSubHeads(frame, id, turned)
  const first = roles.indexOf('stream') >= 0 ? 'about' : 'stream'
  const columns = heads.map((head, column): Column => {
    const label = rawOf(frame.at(0, column))
    const use = column === id ? 'id' : purposeOf(head, roles[column], first)
    return { ...head, column, use, label, beside: [] }
  })
  for (const column of columns) attach(columns, column)
  for (const [row, kind] of subHeads) applySubHead(frame, row, kind, columns, ledger)
  for (const column of columns) if (column.of !== undefined) columns[column.of]?.beside.push(column)
  // A second column of streams, dates or times only describes.
  for (const use of ['stream', 'date', 'time', 'basis'] as const)
    for (const extra of columns.filter((column) => column.use === use).slice(1)) extra.use = 'about'
  for (const column of columns)
    if (column.use === 'result' && isTextColumn(frame, column, subHeads)) column.use = 'text'
  return { columns, subHeads }
}

function purposeOf(head: Head, role: Role | undefined, point: ColumnUse): ColumnUse {
  switch (role) {
    case 'stream':
    case 'date':
    case 'time':
    case 'note':
    case 'method':
    case 'about':
    case 'basis':
    case 'qualifier':
    case 'uncertainty':
    case 'unit':
      return role
    case 'point':
      return point
    case 'id':
    case 'weakId':
    case 'replicate':
      return 'about'
    default:
      return isTotalColumn(head.name) ? 'total' : 'result'
  }
}

/** The column of sample ids: named so, else the first that no analyte's name heads. */
function idColumn(frame: Frame, heads: Head[], roles: (Role | undefined)[]): number {
  const named = roles.flatMap((role, column) => (role === 'id' ? [column] : []))
  if (named.length > 0)
    return named.reduce((best, column) =>
      idRank((heads[column] as Head).name) < idRank((heads[best] as Head).name) ? column : best,
    )
  const weak = roles.indexOf('weakId')
  if (weak >= 0) return weak
  // The corner of a table with samples across: "Component", or nothing.
  if (roles[0] === 'analyte' || (heads[0] as Head).name === '') return 0
  const stream = roles.indexOf('stream')
  const unknown = roles.findIndex((role, column) => {
    const head = heads[column] as Head
    return (
      role === undefined &&
      !head.unit &&
      !isTotalColumn(head.name) &&
      analyteScore(head.name) === 0 &&
      hasLabels(frame, column)
    )
  })
  if (unknown >= 0 && (stream < 0 || unknown < stream)) return unknown
  if (stream >= 0) return stream
  const point = roles.findIndex((role) => role === 'point' || role === 'about')
  if (point >= 0) return point
  const date = roles.findIndex((role) => role === 'date' || role === 'time')
  return Math.max(date, 0)
}

/** Whether a column's first cells are labels: texts that are no results, or whole numbers that never repeat. */
function hasLabels(frame: Frame, column: number): boolean {
  const cells = Array.from({ length: Math.min(frame.height - 1, 40) }, (_, at) => frame.at(at + 1, column)).filter(
    (cell) => !isBlank(cell),
  )
  if (cells.length === 0) return false
  const texts = cells.filter((cell) => parseAny(cell) === undefined).length
  if (texts > cells.length / 2) return true
  return cells.every((cell) => /^\d+$/.test(rawOf(cell))) && new Set(cells.map(rawOf)).size === cells.length
}

function findSubHeads(frame: Frame, id: number, turned: boolean): Map<number, SubHead> {
  const found = new Map<number, SubHead>()
  const last = turned ? frame.height : Math.min(frame.height, 5)
  for (let row = 1; row < last; row++) {
    const kind = subHeadOf(cellsOf(frame, row), id)
    if (kind) found.set(row, kind)
    else if (!turned) break
  }
  return found
}

/** Ties a column of signs, uncertainties or units to the results before it. */
function attach(columns: Column[], column: Column): void {
  const before = columns.slice(0, column.column).findLast((other) => other.use === 'result')
  if (column.use === 'qualifier' || column.use === 'uncertainty' || column.use === 'unit') {
    if (before) column.of = before.column
    else column.use = 'text'
    return
  }
  const spread = /^(.*?) ?(?:±|\+ ?\/ ?[-−–]|uncertainty|unsicherheit|unc\.?|error)$/i.exec(column.name)
  const qualified = /^(.*?)[ _](?:qualifier|qual\.?|flag|Q)$/i.exec(column.name)
  const found = spread ?? qualified
  if (column.use !== 'result' || !before || !found) return
  if (found[1] !== '' && plainSpaces(found[1] as string) !== before.name) return
  column.use = spread ? 'uncertainty' : 'qualifier'
  column.of = before.column
}

function applySubHead(frame: Frame, row: number, kind: SubHead, columns: Column[], ledger: Ledger): void {
  for (const column of columns) {
    const cell = frame.at(row, column.column)
    const text = plainSpaces(textOf(cell))
    if (text === '' || column.use === 'id') continue
    if (kind === 'method') column.method = text
    else if (kind === 'uncertainty') column.spread = text
    else if (kind === 'basis') {
      const basis = basisOf(text)
      if (basis) column.basis = basis
    } else {
      const read = readUnit(text)
      if (!read) {
        ledger.notUnderstood.push(frame.place(row, column.column))
        continue
      }
      if (read.unit && column.unit && read.unit !== column.unit) clash(ledger, column, read.unit)
      else if (read.unit) column.unit = read.unit
      column.basis ??= read.basis
      column.as ??= read.as
    }
  }
}

/** The head gives one unit and the row of units another: neither is believed. */
function clash(ledger: Ledger, column: Column, other: string): void {
  ledger.analytes.set(column.name, {
    units: new Set(),
    bases: new Set(),
    measured: false,
    clashing: [column.unit as string, other],
  })
  column.unit = undefined
}

/** A column of words under a head that names no analyte. */
function isTextColumn(frame: Frame, column: Column, subHeads: Map<number, SubHead>): boolean {
  if (analyteScore(column.name) > 0 || column.unit || column.as) return false
  let words = false
  for (let row = 1; row < frame.height; row++) {
    const cell = frame.at(row, column.column)
    if (isBlank(cell) || subHeads.has(row) || /^[-–—]$/.test(rawOf(cell))) continue
    if (parseAny(cell)) return false
    words = true
  }
  return words || column.name === ''
}
