import { plainSpaces } from '../cells/spaces'
import { readUnit } from '../cells/unit'
import type { Role } from '../heads/roles'
import type { LabShape } from '../model'
import type { FoundTable } from './find-tables'
import { type Cell, isBlank, textOf } from './grid'
import { headScore, rolesOf } from './head-row'
import { isSubHead } from './sub-heads'

const OF_SAMPLES: ReadonlySet<Role | undefined> = new Set([
  'id',
  'stream',
  'point',
  'date',
  'time',
  'note',
  'about',
  'replicate',
])
const LOOK = 60

/** Which way round a table stands, by where its analytes and the words of samples are. */
export function shapeOf(table: FoundTable): LabShape {
  const head = table.columns.map((column) => (table.grid.rows[table.head] as Cell[])[column] ?? '')
  const across = rolesOf(head)
  if (across.includes('analyte') && across.includes('result')) return 'long'
  const rows = table.rows.slice(0, LOOK).map((at) => table.columns.map((column) => table.grid.rows[at]?.[column] ?? ''))
  if (isLongWithoutWords(across, rows)) return 'long'
  const labels = rows.map((row) => row[0] ?? '')
  const down = rolesOf(labels)
  let turned = 0
  if (across[0] === 'analyte') turned += 3
  if (across.some((role, at) => at > 0 && role === 'unit')) turned += 3
  if (hasUnitColumn(head, rows)) turned += 3
  turned += Math.min(4, 2 * down.filter((role) => OF_SAMPLES.has(role)).length)
  turned += 2 * mean(labels.map(headScore))
  let upright = 0
  if (rows[0] && isSubHead(rows[0])) upright += 3
  upright += Math.min(6, 2 * across.filter((role, at) => at > 0 && OF_SAMPLES.has(role)).length)
  upright += 2 * mean(head.slice(1).map(headScore))
  if (across[0] === 'id' && !down.some((role) => OF_SAMPLES.has(role))) upright += 0.5
  return turned > upright ? 'transposed' : 'wide'
}

/** A sample column, then analyte names, a number and a unit a row, with heads that say it only in part. */
function isLongWithoutWords(across: (Role | undefined)[], rows: Cell[][]): boolean {
  if (!across.includes('result') || !across.includes('id')) return false
  const column = across.findIndex(
    (role, at) => role === undefined && mean(rows.map((row) => headScore(row[at]))) >= 1.5,
  )
  return column >= 0
}

/** A column behind the labels whose head is blank and whose cells are units. */
function hasUnitColumn(head: Cell[], rows: Cell[][]): boolean {
  for (let column = 1; column < Math.min(head.length, 4); column++) {
    if (!isBlank(head[column])) continue
    const filled = rows.map((row) => plainSpaces(textOf(row[column]))).filter((text) => text !== '')
    const units = filled.filter((text) => readUnit(text)?.unit !== undefined).length
    if (filled.length > 0 && units >= filled.length * 0.6) return true
  }
  return false
}

function mean(values: number[]): number {
  const known = values.length
  return known === 0 ? 0 : values.reduce((sum, value) => sum + value, 0) / known
}
