import { plainSpaces } from '../cells/spaces'
import { analyteScore } from '../heads/analyte-names'
import { parseHead } from '../heads/head'
import { type Role, roleOf } from '../heads/roles'
import { type Cell, type Grid, isBlank, textOf } from './grid'
import { isDrawnRule, rowFacts } from './row-facts'
import { isSubHead } from './sub-heads'

const LOOK_AHEAD = 30
const KEYS: ReadonlySet<Role | undefined> = new Set(['id', 'stream', 'analyte'])
const FIRST_KEYS: ReadonlySet<Role | undefined> = new Set([
  'id',
  'stream',
  'analyte',
  'date',
  'point',
  'weakId',
  'time',
])

/** The roles of a row's cells, by column. */
export function rolesOf(row: Cell[]): (Role | undefined)[] {
  return row.map((cell) => (isBlank(cell) ? undefined : roleOf(parseHead(textOf(cell)).name)))
}

/** How much a cell looks like the head of an analyte: a known name, or a unit with it. */
export function headScore(cell: Cell | undefined): number {
  if (isBlank(cell)) return 0
  const head = parseHead(textOf(cell))
  if (roleOf(head.name)) return 0
  return Math.min(3, analyteScore(head.name) + (head.unit || head.as ? 2 : 0))
}

/** Whether a table begins with this row: heads, with results below them. */
export function isHeadRow(grid: Grid, at: number): boolean {
  const row = grid.rows[at] as Cell[]
  const facts = rowFacts(row)
  if (facts.filled < 2 || row.some((cell) => textOf(cell).length > 80)) return false
  const below = dataBelow(grid, at)
  if (below === undefined) return false
  const roles = rolesOf(row)
  const first = roles[facts.first]
  if (FIRST_KEYS.has(first) || roles.some((role) => KEYS.has(role))) {
    const samplesAcross = facts.measured === 0 || KEYS.has(first)
    if (isKeyAndValue(grid, at, facts.filled)) return false
    if (samplesAcross) return true
  }
  if (facts.measured > facts.filled / 2) return cornerIsBlank(grid, at, below)
  return looksLikeHeads(grid, at, below, facts.filled)
}

/** A title line of a label and its value, with the heads of the table still to come. */
function isKeyAndValue(grid: Grid, at: number, filled: number): boolean {
  const row = grid.rows[at] as Cell[]
  const cells = row.filter((cell) => !isBlank(cell))
  const values = cells.filter((_, index) => index % 2 === 1)
  const labelled =
    filled === 2 ||
    (filled % 2 === 0 && cells.every((cell, index) => index % 2 === 1 || /:$/.test(textOf(cell).trim())))
  if (!labelled || values.some((cell) => headScore(cell) > 0 || roleOf(parseHead(textOf(cell)).name))) return false
  for (let next = at + 1; next < Math.min(grid.rows.length, at + LOOK_AHEAD); next++) {
    const roles = rolesOf(grid.rows[next] as Cell[])
    if (roles.includes('analyte') && roles.includes('result')) return true
    const facts = rowFacts(grid.rows[next] as Cell[])
    if (
      facts.filled > 2 &&
      facts.measured === 0 &&
      (FIRST_KEYS.has(roles[facts.first]) || roles.some((role) => KEYS.has(role)))
    )
      return true
  }
  return false
}

/** The first row below, past units and rules, that holds a result; undefined where none is near. */
function dataBelow(grid: Grid, at: number): number | undefined {
  for (let next = at + 1, seen = 0; next < grid.rows.length && seen < 12; next++) {
    const facts = rowFacts(grid.rows[next] as Cell[])
    if (facts.filled === 0) continue
    seen++
    if (facts.filled > 1 && facts.measured > 0) return next
  }
  return undefined
}

function nextFilled(grid: Grid, at: number): number | undefined {
  for (let next = at + 1; next < grid.rows.length; next++) {
    const row = grid.rows[next] as Cell[]
    if (rowFacts(row).filled > 0 && !isDrawnRule(row) && !isSubHead(row)) return next
  }
  return undefined
}

/** No known word among the heads: then results must follow at once, and analytes must be known on one side. */
function looksLikeHeads(grid: Grid, at: number, below: number, filled: number): boolean {
  if (nextFilled(grid, at) !== below) return false
  const row = grid.rows[at] as Cell[]
  const first = grid.rows[below] as Cell[]
  if (isSubHead(row)) return false
  const facts = rowFacts(row)
  if (facts.measured > 0 && facts.measured >= filled - 1) return false
  if (row.some((cell) => headScore(cell) >= 2)) return facts.measured === 0
  const corner = first.findIndex((cell) => !isBlank(cell))
  if (corner < facts.first || headScore(first[corner]) >= 2) return true
  return (
    facts.measured === 0 &&
    filled >= rowFacts(first).filled - 1 &&
    row.every((cell) => plainSpaces(textOf(cell)).length < 40)
  )
}

/** Numbers across over analytes down: "; 101; 104" above "NaCl; 1.2; 3.4". */
function cornerIsBlank(grid: Grid, at: number, below: number): boolean {
  if (nextFilled(grid, at) !== below) return false
  const row = grid.rows[at] as Cell[]
  const first = grid.rows[below] as Cell[]
  const corner = first.findIndex((cell) => !isBlank(cell))
  return (
    isBlank(row[corner]) &&
    row.every((cell) => /^[\w /.-]{0,24}$/.test(textOf(cell).trim())) &&
    headScore(first[corner]) >= 2
  )
}
