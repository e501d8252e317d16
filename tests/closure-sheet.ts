import { expect } from 'vitest'
import type { WorkBook } from 'xlsx'
import { type ExportCase, workbookOf } from './export-case'
import { cellsOf, readWorkbook, recalculate, rowsOf, sheetOf } from './workbook'

export type ClosureRow = {
  place: string
  component: string
  in: unknown
  out: unknown
  formed: unknown
  gain: unknown
  difference: unknown
  unknown: unknown
  finding: unknown
}

/** Rows of the closure sheet as another library calculates them, stored results thrown away first. */
export async function calculated(input: ExportCase): Promise<{ workbook: WorkBook; rows: ClosureRow[] }> {
  const workbook = readWorkbook(await workbookOf(input))
  const stored = new Map(
    cellsOf(sheetOf(workbook, 'Closure'))
      .filter(([, { f }]) => f !== undefined)
      .map(([at, { v }]) => [at, v]),
  )
  expect(recalculate(workbook)).toBe(stored.size)
  const sheet = sheetOf(workbook, 'Closure')
  // What a reader that does not calculate shows is what one that does gets.
  for (const [at, before] of stored) {
    const now = (sheet[at] as { v: unknown }).v
    if (typeof before === 'number') expect([at, Number(now)]).toEqual([at, expect.closeTo(before, 6)])
    else expect([at, now]).toEqual([at, before])
  }
  const rows = rowsOf(sheet).map(([place, component, , into, out, formed, gain, difference, , unknown, finding]) => ({
    place: String(place),
    component: String(component),
    in: into,
    out,
    formed,
    gain,
    difference,
    unknown,
    finding,
  }))
  return { workbook, rows }
}

export const balances = (rows: ClosureRow[]): ClosureRow[] =>
  rows.filter(({ gain }) => typeof gain === 'number' || gain === 'not split')
export const streams = (rows: ClosureRow[]): ClosureRow[] =>
  rows.slice(rows.findIndex(({ place }) => place === 'Streams') + 1)
export const rowOf = (rows: ClosureRow[], place: string, component: string): ClosureRow => {
  const row = rows.find((one) => one.place === place && one.component === component)
  if (!row) throw new Error(`No closure row ${place}, ${component}`)
  return row
}
