import { plainSpaces } from '../cells/spaces'
import { headWords, roleOf } from '../heads/roles'
import { type Cell, type Grid, isBlank, textOf } from './grid'
import { headScore, isHeadRow, rolesOf } from './head-row'
import { hasMeasured, isDrawnRule, rowFacts } from './row-facts'
import { isSubHead } from './sub-heads'

/** A table of a grid: its head row, the rows below it and the columns it fills; `titles`: rows above it. */
export type FoundTable = { grid: Grid; head: number; rows: number[]; columns: number[]; titles: number[] }

/** The tables of a grid from top to bottom; rows that belong to none are passed over. */
export function findTables(grid: Grid): { tables: FoundTable[]; passedOver: number[] } {
  const tables: FoundTable[] = []
  const passedOver: number[] = []
  let titles: number[] = []
  for (let at = 0; at < grid.rows.length; ) {
    const row = grid.rows[at] as Cell[]
    if (row.every(isBlank)) {
      at++
      continue
    }
    if (isDrawnRule(row) || !isHeadRow(grid, at)) {
      titles.push(at)
      passedOver.push(at)
      at++
      continue
    }
    const table = tableFrom(grid, at, passedOver)
    tables.push(...sideBySide({ ...table.found, titles }))
    titles = []
    at = table.next
  }
  return { tables, passedOver }
}

function tableFrom(grid: Grid, start: number, passedOver: number[]): { found: FoundTable; next: number } {
  let head = start
  let source = grid
  const grouped = secondHead(grid, start)
  if (grouped) {
    const rows = grid.rows.slice()
    rows[grouped.at] = grouped.cells
    source = { ...grid, rows }
    head = grouped.at
    passedOver.push(start)
  }
  const heads = signature(source.rows[head] as Cell[])
  const labels = rolesOf(source.rows[head] as Cell[])
  const label = Math.max(
    0,
    labels.findIndex((role) => role === 'id' || role === 'analyte'),
  )
  const rows: number[] = []
  let measured = false
  let gap = false
  let at = head + 1
  for (; at < grid.rows.length; at++) {
    const row = grid.rows[at] as Cell[]
    if (row.every(isBlank)) {
      gap = true
      continue
    }
    // Most rows of a long table: results follow results.
    if (measured && !gap && hasMeasured(row) && !startsLike(row, source.rows[head] as Cell[])) {
      rows.push(at)
      continue
    }
    if (isDrawnRule(row) || signature(row) === heads) {
      passedOver.push(at)
      continue
    }
    const facts = rowFacts(row)
    if (measured && facts.filled > 1 && isNewHead(grid, at, label, gap, facts.measured)) break
    if (measured && isSubHead(row)) {
      // Units again, under repeated heads.
      passedOver.push(at)
      continue
    }
    if (facts.measured > 0) measured = true
    gap = facts.filled === 1
    rows.push(at)
  }
  return { found: { grid: source, head, rows, columns: filledColumns(source, [head, ...rows]), titles: [] }, next: at }
}

function isNewHead(grid: Grid, at: number, label: number, gap: boolean, measured: number): boolean {
  const row = grid.rows[at] as Cell[]
  const first = row.findIndex((cell) => !isBlank(cell))
  const roles = rolesOf([row[label] ?? '', row[first] ?? ''])
  const named = roles.some((role) => role === 'id' || role === 'analyte')
  if (named && (measured === 0 || gap)) return isHeadRow(grid, at)
  return gap && isHeadRow(grid, at) && row.some((cell) => headScore(cell) >= 2)
}

/** Whether a row begins with the same text as the heads: then it may be the heads again. */
function startsLike(row: Cell[], head: Cell[]): boolean {
  const first = row.findIndex((cell) => !isBlank(cell))
  const text = plainSpaces(textOf(row[first]))
  return text === plainSpaces(textOf(head[first])) || roleOf(text) !== undefined
}

/** A row's texts as one, blank cells at its end left out: repeated heads have the same. */
function signature(row: Cell[]): string {
  const texts = row.map((cell) => plainSpaces(textOf(cell)))
  return texts.slice(0, texts.findLastIndex((text) => text !== '') + 1).join('\t')
}

/** Group names above the heads ("Anions", "Cations"): the row below holds the real heads. */
function secondHead(grid: Grid, at: number): { at: number; cells: Cell[] } | undefined {
  const below = at + 1
  const row = grid.rows[below]
  const head = grid.rows[at] as Cell[]
  if (!row || isSubHead(row) || isDrawnRule(row)) return undefined
  const facts = rowFacts(row)
  if (facts.filled < 2 || facts.measured > 0 || facts.first === 0) return undefined
  const known = row.filter((cell) => headScore(cell) >= 1).length
  if (known < facts.filled / 2) return undefined
  const cells = Array.from({ length: Math.max(row.length, head.length) }, (_, column) =>
    isBlank(row[column]) ? (head[column] ?? '') : (row[column] as Cell),
  )
  return { at: below, cells }
}

function filledColumns(grid: Grid, rows: number[]): number[] {
  const filled: boolean[] = []
  for (const at of rows) {
    const row = grid.rows[at] as Cell[]
    for (let column = 0; column < row.length; column++)
      if (!filled[column] && !isBlank(row[column])) filled[column] = true
  }
  return filled.flatMap((is, column) => (is ? [column] : []))
}

/** Two tables next to each other, each with a column of samples and a blank column between them. */
function sideBySide(table: FoundTable): FoundTable[] {
  const head = table.grid.rows[table.head] as Cell[]
  const roles = rolesOf(head)
  const starts = table.columns.filter(
    (column) => roles[column] === 'id' && (column === table.columns[0] || !table.columns.includes(column - 1)),
  )
  const names = new Set(starts.map((column) => headWords(textOf(head[column]))))
  if (starts.length < 2 || names.size > 1) return [table]
  return starts.map((start, index) => {
    const end = starts[index + 1] ?? Number.POSITIVE_INFINITY
    return {
      ...table,
      columns: table.columns.filter((column) => (index === 0 || column >= start) && column < end),
      titles: index === 0 ? table.titles : [],
    }
  })
}
